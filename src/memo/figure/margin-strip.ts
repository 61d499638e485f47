import { type ScaleLogarithmic, scaleLog } from 'd3-scale'
import type { CaseResult, Result, Verdict } from '../../verdict/result.ts'
import { caseName } from '../model/case-names.ts'
import { marginText } from '../text/margin.ts'
import { PAINT, VERDICTS } from '../text/verdict.ts'
import { FAINT, type Figure, INK, type Mark, SOFT, type TextMark } from './figure.ts'
import { verdictDot } from './symbols.ts'
import { fitted } from './text-width.ts'

const WIDTH = 500
const LEFT = 138
const RIGHT = 384
const TOP = 46
const BOTTOM = 32
/** Margins outside are drawn on the edge; the words beside the row carry the number. */
export const SHOWN_MARGINS = [0.1, 10] as const

/** Maps a margin to points. */
export const marginScale = (): ScaleLogarithmic<number, number> =>
  scaleLog([...SHOWN_MARGINS], [LEFT, RIGHT]).clamp(true)

/** Every known margin of every case on one strip each, with break-even and guard. */
export function marginStrip(result: Result): Figure {
  const scale = marginScale()
  const row = Math.min(18, Math.max(9, 560 / Math.max(1, result.cases.length)))
  const bottom = TOP + row * result.cases.length
  const rows = result.cases.flatMap((given, k) =>
    caseMarks(given, TOP + row * (k + 0.5), result.guard, scale),
  )
  return {
    id: 'margins',
    title: 'Margins of all checks, case by case',
    description: `${result.cases.map((given) => spoken(given, result.guard)).join('; ')}. Break-even is 1.00, the guard ${1 + result.guard}.`,
    width: WIDTH,
    height: bottom + BOTTOM,
    marks: [...legend(), ...axis(scale, bottom, result.guard), ...rows],
  }
}

function caseMarks(
  given: CaseResult,
  y: number,
  guard: number,
  scale: ScaleLogarithmic<number, number>,
): readonly Mark[] {
  const unknown = given.checks.filter(({ verdict }) => verdict === 'unknown').length
  const said = `${PAINT[given.verdict].sign} ${given.verdict} ${marginText(given.margin, guard)}`
  const marks: Mark[] = [
    { kind: 'line', x1: LEFT, y1: y, x2: RIGHT, y2: y, stroke: FAINT, width: 0.5 },
    words(LEFT - 8, y + 2.5, fitted(caseName(given), 7.5, LEFT - 12), 'end'),
    words(RIGHT + 10, y + 2.5, unknown === 0 ? said : `${said} (${unknown} ?)`, 'start'),
  ]
  for (const { id, margin, verdict } of given.checks) {
    if (margin === null) continue
    const x = scale(Math.max(margin, SHOWN_MARGINS[0]))
    marks.push(verdictDot(verdict, x, y, 26, `${given.option}|${given.node}|${id}`))
  }
  return marks
}

function axis(scale: ScaleLogarithmic<number, number>, bottom: number, guard: number): readonly Mark[] {
  const ticks = [0.1, 0.2, 0.5, 1, 2, 5, 10]
  const shown = (tick: number): string => (tick === 0.1 ? '≤ 0.1' : tick === 10 ? '≥ 10' : String(tick))
  const lines = ticks.flatMap((tick): Mark[] => [
    { kind: 'line', x1: scale(tick), y1: TOP, x2: scale(tick), y2: bottom, stroke: FAINT, width: 0.5 },
    words(scale(tick), bottom + 11, shown(tick), 'middle', SOFT),
  ])
  const even = scale(1)
  const guarded = scale(1 + guard)
  return [
    ...lines,
    { kind: 'line', x1: even, y1: TOP - 4, x2: even, y2: bottom, stroke: INK, width: 1.2, of: 'break-even' },
    {
      kind: 'line',
      x1: guarded,
      y1: TOP - 4,
      x2: guarded,
      y2: bottom,
      stroke: INK,
      width: 0.8,
      dash: [3, 2],
      of: 'guard',
    },
    words(even - 3, TOP - 7, 'break-even 1.00', 'end'),
    words(guarded + 3, TOP - 7, `guard ${Number((1 + guard).toPrecision(4))}`, 'start'),
    words((LEFT + RIGHT) / 2, bottom + 24, 'margin (logarithmic axis)', 'middle', SOFT),
  ]
}

const MEANING: Readonly<Record<Verdict, string>> = {
  pass: 'pass',
  tight: 'tight',
  fail: 'fail',
  unknown: 'unknown: counted beside the row',
}

function legend(): readonly Mark[] {
  return VERDICTS.flatMap((verdict, k): Mark[] => {
    const x = LEFT + [0, 48, 98, 140][k]!
    return [
      verdictDot(verdict, x, 14, 30, `legend|${verdict}`),
      words(x + 7, 16.5, MEANING[verdict], 'start'),
    ]
  })
}

function words(x: number, y: number, text: string, anchor: TextMark['anchor'], fill = INK): TextMark {
  return { kind: 'text', x, y, text, size: 7.5, fill, anchor }
}

function spoken(given: CaseResult, guard: number): string {
  return `${caseName(given)}: ${given.verdict}, smallest margin ${marginText(given.margin, guard)}`
}
