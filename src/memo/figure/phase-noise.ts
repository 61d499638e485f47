import { scaleLinear, scaleLog } from 'd3-scale'
import { line } from 'd3-shape'
import type { ClockingShown } from '../../clocking/shown.ts'
import type { QuantityText } from '../text/quantity.ts'
import { FAINT, type Figure, INK, type Mark, SOFT, type TextMark } from './figure.ts'
import { fitted } from './text-width.ts'

const WIDTH = 500
const HEIGHT = 262
const LEFT = 44
const RIGHT = 340
const TOP = 30
const BOTTOM = 222
/** How far below the least total sources are still drawn, in dB. */
const BELOW = 18

/** How each source is drawn: by dash and weight first, so that black-and-white print keeps them apart. */
const DRAWN: Readonly<
  Record<string, { readonly stroke: string; readonly width: number; readonly dash?: readonly number[] }>
> = {
  reference: { stroke: '#2f6ea8', width: 1, dash: [6, 2] },
  detector: { stroke: '#2f6ea8', width: 1.2 },
  divider: { stroke: '#2f6ea8', width: 1, dash: [1.5, 1.5] },
  modulator: { stroke: '#2f6ea8', width: 1, dash: [3, 3] },
  oscillator: { stroke: '#8f6200', width: 1.2 },
  supply: { stroke: '#8f6200', width: 1, dash: [6, 2] },
  filter: { stroke: '#8f6200', width: 1, dash: [1.5, 1.5] },
}
const TOTAL = { stroke: INK, width: 2 }
const FREE = { stroke: SOFT, width: 0.8, dash: [4, 3] }

/** Maps offsets and levels to points. */
export function phaseNoiseScales({ phaseNoise, band_Hz }: ClockingShown) {
  const { total_dBc_Hz, freeRunning_dBc_Hz } = phaseNoise
  const least = Math.floor((Math.min(...total_dBc_Hz) - BELOW) / 10) * 10
  const most = Math.min(
    Math.ceil((Math.max(...total_dBc_Hz) + 12) / 10) * 10,
    Math.ceil(Math.max(...total_dBc_Hz, ...freeRunning_dBc_Hz) / 10) * 10,
  )
  return {
    x: scaleLog([...band_Hz], [LEFT, RIGHT]),
    y: scaleLinear([least, most], [BOTTOM, TOP]),
  }
}

/**
 * Phase noise at the output of a clock: every source, their total, the free-running oscillator, the band of
 * integration, the loop bandwidth and the corner of a tracking receiver.
 */
export function phaseNoiseFigure(
  shown: ClockingShown,
  id: string,
  title: string,
  write: QuantityText,
): Figure {
  const scales = phaseNoiseScales(shown)
  const { phaseNoise, random } = shown
  const jitter = new Map(random.map((one) => [one.id as string, one.value_s]))
  const curves = phaseNoise.sources.map((source) => ({ ...source, drawn: DRAWN[source.id]! }))
  const marks: Mark[] = [
    ...axes(scales, shown, write),
    curve(scales, phaseNoise.offset_Hz, phaseNoise.freeRunning_dBc_Hz, { ...FREE, of: 'free-running' }),
    ...curves.map(({ id: of, level_dBc_Hz, drawn }) =>
      curve(scales, phaseNoise.offset_Hz, level_dBc_Hz, { ...drawn, of }),
    ),
    curve(scales, phaseNoise.offset_Hz, phaseNoise.total_dBc_Hz, { ...TOTAL, of: 'total' }),
    ...uprights(scales, shown, write),
    ...legend(curves, jitter, shown, write),
  ]
  return { id, title, description: spoken(shown, write), width: WIDTH, height: HEIGHT, marks }
}

type Scales = ReturnType<typeof phaseNoiseScales>
interface Drawn {
  readonly stroke: string
  readonly width: number
  readonly dash?: readonly number[]
  readonly of: string
}

/** The part of a curve inside the frame; where it leaves, it ends on the edge. */
function curve({ x, y }: Scales, offsets: readonly number[], levels: readonly number[], drawn: Drawn): Mark {
  const [least, most] = y.domain() as [number, number]
  const inside = (level: number): boolean => level >= least && level <= most
  const path = line<readonly [number, number]>()
    .defined(([, level]) => inside(level))
    .x(([f]) => rounded(x(f)))
    .y(([, level]) => rounded(y(level)))
  const points = offsets.map((f, k) => [f, levels[k]!] as const)
  return { kind: 'path', x: 0, y: 0, d: path(points) ?? 'M0 0', ...drawn }
}

const rounded = (value: number): number => Math.round(value * 100) / 100

function axes({ x, y }: Scales, { band_Hz }: ClockingShown, write: QuantityText): readonly Mark[] {
  const [low, high] = band_Hz
  const decades = Array.from({ length: 12 }, (_, k) => 10 ** k).filter(
    (f) => f >= low * 0.999 && f <= high * 1.001,
  )
  const [least, most] = y.domain() as [number, number]
  const levels = Array.from({ length: Math.floor((most - least) / 20) + 1 }, (_, k) => most - 20 * k)
  return [
    ...decades.flatMap((f): Mark[] => [
      rule(x(f), TOP, x(f), BOTTOM, FAINT, 0.5),
      words(x(f), BOTTOM + 11, write(f, 'Hz'), 'middle', SOFT),
    ]),
    ...levels.flatMap((level): Mark[] => [
      rule(LEFT, y(level), RIGHT, y(level), FAINT, 0.5),
      words(LEFT - 5, y(level) + 2.5, String(level).replace('-', '−'), 'end', SOFT),
    ]),
    rule(LEFT, BOTTOM, RIGHT, BOTTOM, SOFT, 0.8),
    words(LEFT, TOP - 18, 'phase noise, dBc/Hz', 'start', SOFT),
    words(
      (LEFT + RIGHT) / 2,
      BOTTOM + 24,
      `offset from the carrier; integrated from ${write(low, 'Hz')} to ${write(high, 'Hz')}`,
      'middle',
      SOFT,
    ),
  ]
}

const FROM: Readonly<Record<ClockingShown['bandwidthFrom'], string>> = {
  stated: 'stated',
  optimum: 'least jitter',
  limit: 'stability limit',
  reference: 'by the reference',
}

function uprights({ x }: Scales, shown: ClockingShown, write: QuantityText): readonly Mark[] {
  const { bandwidth_Hz, bandwidthFrom, tracking_Hz, band_Hz } = shown
  const inBand = (f: number): boolean => f > band_Hz[0] && f < band_Hz[1]
  const marks: Mark[] = []
  if (inBand(bandwidth_Hz)) {
    const at = x(bandwidth_Hz)
    const said = `bandwidth ${write(bandwidth_Hz, 'Hz', undefined, 3)} (${FROM[bandwidthFrom]})`
    marks.push(
      { ...rule(at, TOP - 4, at, BOTTOM, INK, 0.9, [4, 2]), of: 'bandwidth' },
      words(Math.min(at, RIGHT - 90), TOP - 7, said, 'middle', INK),
    )
  }
  if (tracking_Hz !== null && inBand(tracking_Hz)) {
    const at = x(tracking_Hz)
    marks.push(
      { ...rule(at, TOP, at, BOTTOM, SOFT, 0.9, [1.5, 2]), of: 'tracking' },
      words(at + 3, TOP + 8, `tracked below ${write(tracking_Hz, 'Hz')}`, 'start', SOFT),
    )
  }
  return marks
}

const KEY = RIGHT + 14

function legend(
  curves: readonly { readonly id: string; readonly label: string; readonly drawn: Omit<Drawn, 'of'> }[],
  jitter: ReadonlyMap<string, number>,
  { tracking_Hz, random, randomSum_s }: ClockingShown,
  write: QuantityText,
): readonly Mark[] {
  const fs = (value: number | undefined): string => (value === undefined ? '' : write(value, 's', 'fs', 3))
  const rows = [
    { label: 'total', drawn: TOTAL as Omit<Drawn, 'of'>, text: '' },
    ...curves.map(({ id, label, drawn }) => ({ label, drawn, text: fs(jitter.get(id)) })),
    { label: 'oscillator, free', drawn: FREE as Omit<Drawn, 'of'>, text: '' },
  ]
  const head = tracking_Hz === null ? 'rms jitter' : 'rms, tracked'
  const inCurves = new Set(curves.map(({ id }) => id))
  const foot = [
    ...random
      .filter(({ id }) => !inCurves.has(id))
      .map(({ label, value_s }) => `${label} adds ${fs(value_s)}`),
    `in all ${fs(randomSum_s)} rms`,
  ]
  return [
    words(WIDTH - 4, TOP - 2, head, 'end', SOFT),
    ...rows.flatMap(({ label, drawn, text }, k): Mark[] => {
      const y = TOP + 12 + 15 * k
      return [
        { kind: 'line', x1: KEY, y1: y - 2.5, x2: KEY + 22, y2: y - 2.5, ...drawn },
        words(KEY + 27, y, fitted(label, 7.5, 88), 'start', INK),
        words(WIDTH - 4, y, text, 'end', INK),
      ]
    }),
    ...foot.map((text, k) => words(WIDTH - 4, TOP + 24 + 15 * (rows.length + k), text, 'end', INK)),
  ]
}

function rule(
  x1: number,
  y1: number,
  x2: number,
  y2: number,
  stroke: string,
  width: number,
  dash?: readonly number[],
): Extract<Mark, { kind: 'line' }> {
  return { kind: 'line', x1, y1, x2, y2, stroke, width, ...(dash === undefined ? {} : { dash }) }
}

function words(x: number, y: number, text: string, anchor: TextMark['anchor'], fill: string): TextMark {
  return { kind: 'text', x, y, text, size: 7.5, fill, anchor }
}

function spoken(shown: ClockingShown, write: QuantityText): string {
  const { random, bandwidth_Hz, bandwidthFrom, randomSum_s, band_Hz, tracking_Hz } = shown
  const lines = random.map(({ label, value_s }) => `${label} ${write(value_s, 's', 'fs', 3)}`).join(', ')
  const tracked = tracking_Hz === null ? '' : `, tracked below ${write(tracking_Hz, 'Hz')}`
  return `Loop bandwidth ${write(bandwidth_Hz, 'Hz')} (${FROM[bandwidthFrom]}); random jitter by line, integrated from ${write(band_Hz[0], 'Hz')} to ${write(band_Hz[1], 'Hz')}${tracked}: ${lines}; in all ${write(randomSum_s, 's', 'fs', 3)} rms.`
}
