import { type Bench, benchAt, type Case } from '../blocks/bench.ts'
import { PLAIN } from '../derivation/trace.ts'
import type { OperatingPoint } from '../device/conditions.ts'
import { logSpaced } from '../numeric/power-law.ts'
import { allowanceOf, isAllowed, type Quantity, quantile } from './budget/allowances.ts'
import { type BudgetLines, budgetLinesAt } from './budget/lines.ts'
import { SOURCE_NAMES, type SourceName } from './loop/line-jitter.ts'
import { freeRunningAt, levelOf, spectrumOf } from './loop/spectrum.ts'

/** What a reader is shown of a clock beside its checks: curves and lines of the budget. SI, levels in dBc/Hz. */
export interface ClockingShown {
  readonly frequency_Hz: number
  readonly multiplication: number
  readonly reference_Hz: number
  readonly fractional: boolean
  readonly bandwidth_Hz: number
  /** `stated`, `optimum`, `limit` when the optimum lies beyond what is stable, `reference` in a realigned oscillator. */
  readonly bandwidthFrom: 'stated' | 'optimum' | 'limit' | 'reference'
  readonly band_Hz: readonly [number, number]
  readonly tracking_Hz: number | null
  readonly phaseNoise: {
    readonly offset_Hz: readonly number[]
    readonly total_dBc_Hz: readonly number[]
    readonly freeRunning_dBc_Hz: readonly number[]
    readonly sources: readonly NoiseCurve[]
  }
  /**
   * Random jitter, rms, by line, as it counts: behind a receiver that tracks where there is one, and without the
   * receiver's own lines where every allowance is one of a transmitter.
   */
  readonly random: readonly BudgetLine[]
  /** Bounded jitter, peak to peak, by line. */
  readonly bounded: readonly BudgetLine[]
  /** Lines of the receiver that no allowance counts. */
  readonly leftOut: readonly string[]
  readonly randomSum_s: number
  readonly boundedSum_s: number
  /** At the error ratio; null when the scenario states none. */
  readonly total_s: number | null
  readonly errorRatio: number | null
  readonly UI_s: number | null
  readonly allowances: readonly {
    readonly quantity: Quantity
    readonly limit_s: number
    readonly sure: boolean
  }[]
  /** The line that makes most of the random jitter, its share of the variance, and what halving it leaves. */
  readonly largest: { readonly label: string; readonly share: number; readonly halved_s: number }
}

export interface NoiseCurve {
  readonly id: SourceName
  readonly label: string
  readonly level_dBc_Hz: readonly number[]
}

export interface BudgetLine {
  readonly id: string
  readonly label: string
  readonly value_s: number
}

/** A line, and whether only the receiver has it. */
type Line = BudgetLine & { readonly receiverOnly: boolean }

const LABELS: Readonly<Record<SourceName, string>> = {
  reference: 'reference',
  detector: 'detector',
  divider: 'divider',
  modulator: 'modulator',
  oscillator: 'oscillator',
  supply: 'oscillator supply',
  filter: 'loop filter',
}

/** Points a decade of the curves that are drawn. */
const DRAWN = 8

/**
 * The clock of a case, at the operating point at which it jitters most.
 *
 * @param given the case
 * @param points operating points that it is judged at
 * @returns curves and budget, or null when there is no loop or it cannot be computed
 */
export function clockingShown(given: Case, points: readonly OperatingPoint[]): ClockingShown | null {
  if (given.settings.loop === null) return null
  let worst: { readonly lines: BudgetLines; readonly bench: Bench } | null = null
  for (const at of points) {
    const bench = benchAt(given, at, PLAIN)
    const lines = bench.once(budgetLinesAt)
    if (!('sigma_all' in lines)) return null
    if (worst === null || lines.loop.sigma > worst.lines.loop.sigma) worst = { lines, bench }
  }
  return worst === null ? null : shownOf(worst.lines, worst.bench)
}

function shownOf(lines: BudgetLines, bench: Bench): ClockingShown {
  const { loop } = lines
  const { settings, rates } = bench
  const { band, reference } = settings.loop!
  const { sources, f_c, f_CDR } = loop
  const { error_ratio } = settings
  const allowances = QUANTITIES.filter((one) => isAllowed(bench, one)).map((quantity) => ({
    quantity,
    ...allowanceOf(bench, quantity),
  }))
  const sent = allowances.length > 0 && allowances.every(({ counts }) => counts === 'transmitter')
  const counted = ({ receiverOnly }: Line): boolean => !(sent && receiverOnly)
  const [random, bounded] = [randomLines(lines, bench), boundedLines(lines)]
  const [randomSum, boundedSum] = sent ? [lines.sigma_tx, lines.DJ_tx] : [lines.sigma_all, lines.DJ_all]
  return {
    frequency_Hz: sources.oscillator.f_0,
    multiplication: sources.N,
    reference_Hz: reference,
    fractional: sources.fractional,
    bandwidth_Hz: f_c,
    bandwidthFrom: origin(lines, bench),
    band_Hz: band,
    tracking_Hz: f_CDR,
    phaseNoise: curves(lines, band),
    random: random.filter(counted).map(plain),
    bounded: bounded.filter(counted).map(plain),
    leftOut: [...random, ...bounded].filter((one) => !counted(one)).map(({ label }) => label),
    randomSum_s: randomSum,
    boundedSum_s: boundedSum,
    total_s:
      error_ratio === null
        ? null
        : boundedSum + 2 * quantile(error_ratio, 'this scenario', PLAIN) * randomSum,
    errorRatio: error_ratio,
    UI_s: rates.UI,
    allowances: allowances.map(({ quantity, limit, sure }) => ({ quantity, limit_s: limit, sure })),
    largest: largestOf(random.filter(counted), randomSum),
  }
}

const plain = ({ id, label, value_s }: Line): BudgetLine => ({ id, label, value_s })

const QUANTITIES: readonly Quantity[] = ['random', 'bounded', 'total', 'even_odd', 'rms', 'tail']

function origin({ loop }: BudgetLines, { settings }: Bench): ClockingShown['bandwidthFrom'] {
  if (settings.loop!.kind === 'realigned') return 'reference'
  if (loop.atLimit === null) return 'stated'
  return loop.atLimit ? 'limit' : 'optimum'
}

function curves({ loop }: BudgetLines, [f_1, f_2]: readonly [number, number]): ClockingShown['phaseNoise'] {
  const { offset, of, total } = spectrumOf(loop, logSpaced(f_1, f_2, DRAWN))
  const level = (density: Float64Array): readonly number[] =>
    Array.from(density, (one) => Math.max(FLOOR, levelOf(one)))
  const sources = SOURCE_NAMES.filter((name) => of[name].some((one) => one > 0)).map((id) => ({
    id,
    label: LABELS[id],
    level_dBc_Hz: level(of[id]),
  }))
  return {
    offset_Hz: [...offset],
    total_dBc_Hz: level(total),
    freeRunning_dBc_Hz: level(offset.map((f) => freeRunningAt(loop.sources, f))),
    sources,
  }
}

/** Below any noise that matters; in place of the logarithm of nothing. */
const FLOOR = -300

function randomLines({ loop, path }: BudgetLines, { block, settings }: Bench): readonly Line[] {
  const line = (id: string, label: string, value_s: number, receiverOnly = false): Line => ({
    id,
    label,
    value_s,
    receiverOnly,
  })
  return [
    ...SOURCE_NAMES.map((name) => line(name, LABELS[name], loop.judged[name])),
    line('path', 'clock path', path.sigma),
    ...(block === 'link' ? [line('aperture', "sampler's aperture", settings.receiver.aperture, true)] : []),
  ].filter(({ value_s }) => value_s > 0)
}

function boundedLines({ J_supply, J_driver, J_spur, J_tone, J_rec }: BudgetLines): readonly Line[] {
  const all = [
    ['ripple', 'ripple on the clock path', J_supply, false],
    ['driver', 'ripple on the driver', J_driver, false],
    ['spur', 'reference spur', J_spur, false],
    ['tone', 'tone on the supply', J_tone, false],
    ['recovery', 'clock recovery', J_rec, true],
  ] as const
  return all.flatMap(([id, label, value_s, receiverOnly]) =>
    value_s === null ? [] : [{ id, label, value_s, receiverOnly }],
  )
}

function largestOf(random: readonly BudgetLine[], sum: number): ClockingShown['largest'] {
  const most = random.reduce((a, b) => (b.value_s > a.value_s ? b : a))
  const share = (most.value_s / sum) ** 2
  return { label: most.label, share, halved_s: sum * Math.sqrt(1 - 0.75 * share) }
}
