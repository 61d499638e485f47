import { type ScaleLinear, scaleLinear } from 'd3-scale'
import type { ClockingShown } from '../../clocking/shown.ts'
import type { QuantityText } from '../text/quantity.ts'
import { FAINT, type Figure, INK, type Mark, SOFT, type TextMark } from './figure.ts'
import { fitted } from './text-width.ts'

const WIDTH = 500
const LEFT = 128
const RIGHT = 400
const ROW = 13
const HEAD = 34
const FOOT = 26

/** One bar: from where to where on its scale, in seconds. */
export interface Fall {
  readonly id: string
  readonly label: string
  readonly from: number
  readonly to: number
  /** The line's own jitter. */
  readonly value: number
  readonly kind: 'line' | 'sum'
}

/** Random lines cumulated in square, largest first: each bar is what its line adds to the root of the sum. */
export function randomFalls({ random, randomSum_s }: ClockingShown): readonly Fall[] {
  let square = 0
  const lines = [...random].sort((a, b) => b.value_s - a.value_s)
  const falls = lines.map(({ id, label, value_s }) => {
    const from = Math.sqrt(square)
    square += value_s ** 2
    return { id, label, from, to: Math.sqrt(square), value: value_s, kind: 'line' as const }
  })
  return [...falls, sumOf('random', 'random, rms', randomSum_s)]
}

/** Bounded lines added, then the random part at the error ratio. */
export function boundedFalls(shown: ClockingShown): readonly Fall[] {
  let sum = 0
  const falls = shown.bounded.map(({ id, label, value_s }) => {
    const from = sum
    sum += value_s
    return { id, label, from, to: sum, value: value_s, kind: 'line' as const }
  })
  const bounded = sumOf('bounded', 'bounded, peak to peak', shown.boundedSum_s)
  const { total_s, boundedSum_s, errorRatio } = shown
  if (total_s === null) return [...falls, bounded]
  const tails: Fall = {
    id: 'tails',
    label: `random at ${ratioText(errorRatio)}`,
    from: boundedSum_s,
    to: total_s,
    value: total_s - boundedSum_s,
    kind: 'line',
  }
  return [...falls, bounded, tails, sumOf('total', 'total', total_s)]
}

const sumOf = (id: string, label: string, value: number): Fall => ({
  id,
  label,
  from: 0,
  to: value,
  value,
  kind: 'sum',
})

/** 1e-6 rather than 0.000001. */
const ratioText = (ratio: number | null): string =>
  ratio === null ? '' : ratio < 0.01 ? ratio.toExponential().replace('-', '−') : String(ratio)

const ALLOWED: Readonly<Record<string, readonly [row: string, word: string]>> = {
  random: ['random', 'allowed'],
  bounded: ['bounded', 'allowed'],
  total: ['total', 'allowed'],
}

/** The jitter budget line by line, in time and in unit intervals: random in square above, bounded and total below. */
export function jitterWaterfall(
  shown: ClockingShown,
  id: string,
  title: string,
  write: QuantityText,
): Figure {
  const upper = panel(shown, randomFalls(shown), 0, 'Random jitter, rms: lines add in square', write)
  const lower = panel(
    shown,
    boundedFalls(shown),
    upper.height + 10,
    shown.total_s === null
      ? 'Bounded jitter, peak to peak: lines add'
      : 'Bounded and total jitter, peak to peak: lines add',
    write,
  )
  return {
    id,
    title,
    description: spoken(shown, write),
    width: WIDTH,
    height: upper.height + 10 + lower.height,
    marks: [...upper.marks, ...lower.marks],
  }
}

function panel(
  shown: ClockingShown,
  falls: readonly Fall[],
  top: number,
  title: string,
  write: QuantityText,
): { readonly marks: readonly Mark[]; readonly height: number } {
  const limits = shown.allowances.flatMap(({ quantity, limit_s }) => {
    const at = ALLOWED[quantity]
    return at !== undefined && falls.some(({ id }) => id === at[0])
      ? [{ row: at[0], limit_s, word: at[1] }]
      : []
  })
  const most = Math.max(...falls.map(({ to }) => to), ...limits.map(({ limit_s }) => limit_s))
  const scale = scaleLinear([0, most * 1.04], [LEFT, RIGHT])
  const bottom = top + HEAD + ROW * falls.length
  const marks: Mark[] = [
    words(0, top + 10, title, 'start', INK, true),
    ...axis(shown, scale, top + HEAD, bottom, write),
    ...falls.flatMap((fall, k) => bar(shown, fall, scale, top + HEAD + ROW * k, write)),
    ...limits.flatMap(({ row, limit_s, word }) => {
      const k = falls.findIndex(({ id }) => id === row)
      return limit(scale(limit_s), scale(falls[k]!.to), top + HEAD + ROW * k, word, row)
    }),
  ]
  return { marks, height: bottom + FOOT - top }
}

function axis(
  { UI_s }: ClockingShown,
  scale: ScaleLinear<number, number>,
  top: number,
  bottom: number,
  write: QuantityText,
): readonly Mark[] {
  const ticks = scale.ticks(5)
  const largest = ticks.at(-1) ?? 0
  const unit = largest >= 1e-12 ? 'ps' : 'fs'
  const inUI = UI_s === null ? [] : scaleLinear([0, scale.domain()[1]! / UI_s], [LEFT, RIGHT]).ticks(5)
  const toX = (ui: number): number => scale(ui * UI_s!)
  return [
    ...ticks.flatMap((at): Mark[] => [
      rule(scale(at), top, scale(at), bottom, FAINT, 0.5),
      words(scale(at), bottom + 10, at === 0 ? '0' : write(at, 's', unit, 3), 'middle', SOFT),
    ]),
    ...inUI.flatMap((ui): Mark[] => [
      rule(toX(ui), top - 3, toX(ui), top, SOFT, 0.6),
      words(toX(ui), top - 5, ui === 0 ? '0' : `${Number(ui.toPrecision(3))} UI`, 'middle', SOFT),
    ]),
  ]
}

function bar(
  { UI_s }: ClockingShown,
  { id, label, from, to, value, kind }: Fall,
  scale: ScaleLinear<number, number>,
  y: number,
  write: QuantityText,
): readonly Mark[] {
  const interval = UI_s === null ? '' : ` = ${(value / UI_s).toPrecision(2)} UI`
  return [
    words(LEFT - 6, y + 8.5, fitted(label, 7.5, LEFT - 10), 'end', INK, kind === 'sum'),
    {
      kind: 'rect',
      x: scale(from),
      y: y + 2,
      width: Math.max(0.6, scale(to) - scale(from)),
      height: ROW - 4,
      fill: kind === 'sum' ? '#123a63' : '#9fc0de',
      of: id,
    },
    words(RIGHT + 6, y + 8.5, `${write(value, 's', undefined, 3)}${interval}`, 'start', INK, kind === 'sum'),
  ]
}

/** Room that the word beside the limit takes. */
const WORD = 30

/** The limit and its word: in its own row beside the line where there is room, inside the bar in white where not. */
function limit(x: number, end: number, y: number, word: string, row: string): readonly Mark[] {
  const left = x - WORD > end
  const right = !left && x + WORD < RIGHT && x >= end
  const at = left || !right ? x - 3 : x + 3
  return [
    { ...rule(x, y - 1, x, y + ROW, INK, 1.6), of: `allowed ${row}` },
    words(at, y + 8.5, word, right ? 'start' : 'end', left || right ? INK : '#ffffff'),
  ]
}

function rule(x1: number, y1: number, x2: number, y2: number, stroke: string, width: number) {
  return { kind: 'line' as const, x1, y1, x2, y2, stroke, width }
}

function words(
  x: number,
  y: number,
  text: string,
  anchor: TextMark['anchor'],
  fill: string,
  bold = false,
): TextMark {
  return { kind: 'text', x, y, text, size: 7.5, fill, anchor, ...(bold ? { bold } : {}) }
}

function spoken(
  { bounded, boundedSum_s, randomSum_s, total_s, allowances }: ClockingShown,
  write: QuantityText,
): string {
  const lines = bounded.map(({ label, value_s }) => `${label} ${write(value_s, 's')}`).join(', ')
  const total = total_s === null ? '' : `; total ${write(total_s, 's')}`
  const limits = allowances.map(({ quantity, limit_s }) => `${quantity} ${write(limit_s, 's')}`).join(', ')
  return `Random jitter ${write(randomSum_s, 's')} rms; bounded jitter ${write(boundedSum_s, 's')} peak to peak (${lines})${total}${limits === '' ? '' : `; allowed: ${limits}`}.`
}
