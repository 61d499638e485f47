import { type ScaleContinuousNumeric, scaleLinear, scaleLog } from 'd3-scale'
import type { CheckResult, Result, Verdict } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'
import { marginText } from '../text/margin.ts'
import { PAINT } from '../text/verdict.ts'
import { FAINT, type Figure, INK, type Mark, SOFT } from './figure.ts'
import { fitted } from './text-width.ts'

interface Bar {
  readonly key: string
  readonly node: string
  readonly required: number | null
  readonly available: number | null
  readonly verdict: Verdict
  readonly margin: string
}

interface Group {
  readonly title: string
  readonly bars: readonly Bar[]
}

const WIDTH = 500
const ROW = 9.5
const GROUP_HEAD = 12.5
const TOP = 40
const BOTTOM = 30
const LEFT = 78
const RIGHT = 392
/** A figure taller than this is divided, so that it fits a page. */
const TALLEST = 800

/**
 * Required against available transit frequency of every sub-block: one figure an option (more where one would
 * not fit a page), all on one axis so that options can be compared.
 */
export function speedBars(result: Result): readonly Figure[] {
  const speeds = result.cases.flatMap(({ checks }) => checks.filter(isSpeed)).flatMap(bothOf)
  if (speeds.length === 0) return []
  const scale = speedScale(speeds)
  return result.options.flatMap(({ id, label }) => {
    const parts = divided(groupsOf(result, id))
    return parts.map((groups, k) => {
      const part = parts.length === 1 ? '' : ` (${k + 1} of ${parts.length})`
      return panel(
        groups,
        `${clean(label || id)}${part}`,
        `speed-${result.options.findIndex((o) => o.id === id)}-${k}`,
        scale,
      )
    })
  })
}

/** Device speed checks are told by what they compare. */
export function isSpeed({ unit, quantity }: CheckResult): boolean {
  return unit === 'Hz' && /transit frequency/.test(quantity)
}

function bothOf({ required, available }: CheckResult): readonly number[] {
  return [required, available].filter((value): value is number => value !== null && value > 0)
}

/** Linear from zero while the values are of one order, else logarithmic. Maps hertz to points. */
export function speedScale(speeds: readonly number[]): ScaleContinuousNumeric<number, number> {
  const least = Math.min(...speeds)
  const most = Math.max(...speeds)
  if (most / least <= 12) return scaleLinear([0, most * 1.02], [LEFT, RIGHT])
  return scaleLog([least / 1.6, most * 1.05], [LEFT, RIGHT])
}

function groupsOf(result: Result, option: string): readonly Group[] {
  const groups = new Map<string, Bar[]>()
  for (const given of result.cases) {
    if (given.option !== option) continue
    for (const check of given.checks.filter(isSpeed)) {
      const title = clean(check.title.replace(/:\s*device speed$/i, ''))
      const bars = groups.get(title) ?? []
      const { required, available, verdict, margin } = check
      const key = `${option}|${given.node}|${check.id}`
      bars.push({
        key,
        node: clean(given.node),
        required,
        available,
        verdict,
        margin: marginText(margin, result.guard),
      })
      groups.set(title, bars)
    }
  }
  return [...groups].map(([title, bars]) => ({ title, bars }))
}

const heightOf = ({ bars }: Group): number => GROUP_HEAD + bars.length * ROW

function divided(groups: readonly Group[]): readonly (readonly Group[])[] {
  const parts: Group[][] = []
  let height = Number.POSITIVE_INFINITY
  for (const group of groups) {
    if (height + heightOf(group) > TALLEST) {
      parts.push([])
      height = TOP + BOTTOM
    }
    parts[parts.length - 1]!.push(group)
    height += heightOf(group)
  }
  return parts
}

function panel(
  groups: readonly Group[],
  name: string,
  id: string,
  scale: ScaleContinuousNumeric<number, number>,
): Figure {
  const bottom = TOP + groups.reduce((sum, group) => sum + heightOf(group), 0)
  const marks: Mark[] = [...axis(scale, bottom), ...legend()]
  let y = TOP
  for (const group of groups) {
    marks.push(label(4, y + 9, fitted(group.title, 8, 380), 8, INK, true))
    y += GROUP_HEAD
    for (const bar of group.bars) {
      marks.push(...barMarks(bar, y, scale))
      y += ROW
    }
  }
  return {
    id,
    title: `Required and available device speed: ${name}`,
    description: groups.map(({ title, bars }) => `${title}: ${bars.map(spoken).join('; ')}.`).join(' '),
    width: WIDTH,
    height: bottom + BOTTOM,
    marks,
  }
}

function barMarks(bar: Bar, y: number, scale: ScaleContinuousNumeric<number, number>): readonly Mark[] {
  const { mark, edge, sign } = PAINT[bar.verdict]
  const start = LEFT
  const marks: Mark[] = [label(LEFT - 4, y + 7, fitted(bar.node, 7, LEFT - 12), 7, INK, false, 'end')]
  if (bar.available !== null && bar.available > 0) {
    const width = scale(bar.available) - start
    const shown = { x: start, y: y + 1.5, width, height: ROW - 4, fill: mark, stroke: edge }
    marks.push({ kind: 'rect', ...shown, of: `available|${bar.key}` })
  }
  if (bar.available === null) marks.push(label(LEFT + 4, y + 7, 'no operating point', 6.5, SOFT, false))
  if (bar.required !== null && bar.required > 0) {
    const x = scale(bar.required)
    marks.push({ kind: 'line', x1: x, y1: y - 0.5, x2: x, y2: y + ROW - 0.5, stroke: '#ffffff', width: 3.4 })
    marks.push({
      kind: 'line',
      x1: x,
      y1: y - 0.5,
      x2: x,
      y2: y + ROW - 0.5,
      stroke: INK,
      width: 1.8,
      of: `required|${bar.key}`,
    })
  }
  marks.push(label(RIGHT + 8, y + 7, `${sign} ${bar.verdict} ${bar.margin}`, 7, INK, false))
  return marks
}

function axis(scale: ScaleContinuousNumeric<number, number>, bottom: number): readonly Mark[] {
  const isLog = scale.domain()[0]! > 0
  const marks: Mark[] = []
  let last = Number.NEGATIVE_INFINITY
  for (const tick of axisTicks(scale, isLog)) {
    const x = scale(tick)
    if (x - last < 26) continue
    last = x
    marks.push({ kind: 'line', x1: x, y1: TOP, x2: x, y2: bottom, stroke: FAINT, width: 0.5 })
    marks.push(label(x, bottom + 10, String(Number((tick / 1e9).toPrecision(4))), 7, SOFT, false, 'middle'))
  }
  const title = `transit frequency, GHz${isLog ? ' (logarithmic axis)' : ''}`
  return [...marks, label((LEFT + RIGHT) / 2, bottom + 22, title, 7, SOFT, false, 'middle')]
}

function axisTicks(scale: ScaleContinuousNumeric<number, number>, isLog: boolean): readonly number[] {
  if (!isLog) return scale.ticks(6)
  const [from, to] = scale.domain() as [number, number]
  const decades = Array.from({ length: 8 }, (_, k) => 10 ** (k + 6))
  return decades
    .flatMap((decade) => [1, 2, 5].map((k) => k * decade))
    .filter((tick) => tick >= from && tick <= to)
}

function legend(): readonly Mark[] {
  const y = 16
  return [
    {
      kind: 'rect',
      x: LEFT,
      y: y - 5.5,
      width: 26,
      height: 6.5,
      fill: PAINT.pass.mark,
      stroke: PAINT.pass.edge,
    },
    label(LEFT + 32, y, 'available under headroom or by rule, worst corner', 7.5, INK, false),
    { kind: 'line', x1: LEFT + 13, y1: y + 7, x2: LEFT + 13, y2: y + 18, stroke: INK, width: 1.8 },
    label(LEFT + 32, y + 15, 'required', 7.5, INK, false),
    label(RIGHT + 8, y, 'verdict, margin', 7.5, SOFT, false),
  ]
}

function label(
  x: number,
  y: number,
  text: string,
  size: number,
  fill: string,
  bold: boolean,
  anchor: 'start' | 'middle' | 'end' = 'start',
): Mark {
  return { kind: 'text', x, y, text, size, fill, anchor, ...(bold ? { bold } : {}) }
}

function spoken({ node, required, available, verdict, margin }: Bar): string {
  const gigahertz = (value: number | null): string =>
    value === null ? 'unknown' : `${Number((value / 1e9).toPrecision(3))} GHz`
  return `${node} requires ${gigahertz(required)}, has ${gigahertz(available)}, ${verdict}, margin ${margin}`
}
