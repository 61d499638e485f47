import type { Bench, Case } from '../../blocks/bench.ts'
import type { Trace } from '../../derivation/trace.ts'
import { upperTailInverse } from '../../numeric/normal.ts'
import { allowedRms, allowedTime } from './dual-dirac.ts'
import { type Limit, PRESET_TABLE, type Preset } from './presets.ts'

/** What a jitter budget may be judged on. */
export type Quantity = 'random' | 'bounded' | 'total' | 'even_odd' | 'rms' | 'tail'

/** An allowance in time, where it comes from, and whether it may decide. */
export interface Allowance {
  /** [s] */
  readonly limit: number
  readonly basis: string
  /** False for limits that must be read in the standard first. */
  readonly sure: boolean
  /** What counts against it: the transmitter's jitter as a standard measures it, or the whole path. */
  readonly counts: 'transmitter' | 'all'
  /** Error ratio of total jitter; null when the scenario states none. */
  readonly error_ratio: number | null
  /** n of J_n. */
  readonly n: number | null
}

/** The preset of a case, if it names one. */
export const presetOf = ({ settings }: Pick<Case, 'settings'>): Preset | null =>
  settings.jitter_budget?.preset == null ? null : PRESET_TABLE[settings.jitter_budget.preset]

const STATED = ['random', 'bounded', 'total', 'even_odd'] as const

/** Whether a case allows for a quantity, by its own numbers or by its preset. */
export function isAllowed(given: Case, quantity: Quantity): boolean {
  const budget = given.settings.jitter_budget
  if (budget === null) return false
  if (quantity === 'even_odd' && (given.block === 'clock' || given.settings.clocking === 'full-rate'))
    return false
  return statedOf(given, quantity) !== null || presetLimit(presetOf(given), quantity) !== null
}

function statedOf({ settings }: Pick<Case, 'settings'>, quantity: Quantity): Limit | null {
  const budget = settings.jitter_budget!
  const known = STATED.find((one) => one === quantity)
  if (known === undefined) return null
  const [time, intervals] = [budget[known], budget[`${known}_ui`]]
  if (intervals !== null) return { value: intervals, unit: 'UI' }
  return time === null ? null : { value: time, unit: 's' }
}

function presetLimit(preset: Preset | null, quantity: Quantity): Limit | null {
  if (preset === null) return null
  if (quantity === 'random') return preset.random ?? preset.randomPeak ?? null
  return preset[quantity] ?? null
}

/** The allowance of a quantity that {@link isAllowed}; a number of the scenario wins over its preset. */
export function allowanceOf(bench: Bench, quantity: Quantity): Allowance {
  const own = statedOf(bench, quantity)
  const { error_ratio } = bench.settings
  if (own !== null) {
    return {
      limit: inTime(
        own,
        {
          meaning: 'allowance of the scenario',
          source: 'this scenario',
          path: `jitter_budget.${quantity}${own.unit === 'UI' ? '_ui' : ''}`,
        },
        bench,
      ),
      basis: "the scenario's allowance",
      sure: true,
      counts: 'all',
      error_ratio,
      n: null,
    }
  }
  const preset = presetOf(bench)!
  const rest = {
    basis: `${preset.title}: ${preset.clause} (${preset.evidence})`,
    sure: !preset.unsure,
    counts: preset.at === 'transmitter' ? ('transmitter' as const) : ('all' as const),
    error_ratio: preset.error_ratio,
    n: quantity === 'tail' ? preset.tail!.n : null,
  }
  if (quantity === 'random' && preset.random === undefined) return { limit: fromPeak(preset, bench), ...rest }
  const limit = presetLimit(preset, quantity)!
  return {
    limit: inTime(limit, { meaning: `allowance of ${preset.title}`, source: preset.clause }, bench),
    ...rest,
  }
}

function inTime(
  { value, unit }: Limit,
  about: { readonly meaning: string; readonly source: string; readonly path?: string },
  { t, rates }: Bench,
): number {
  if (unit === 's')
    return about.path === undefined ? t.leaf({ symbol: 'J_lim', unit, ...about }, value) : value
  return t.calc(allowedTime, t.leaf({ symbol: 'L', unit, ...about }, value), rates.UI!)
}

function fromPeak(preset: Preset, { t, rates }: Bench): number {
  const about = {
    symbol: 'J_pp',
    meaning: `random jitter allowed, peak to peak at ${preset.error_ratio}`,
    unit: 'UI',
    source: preset.clause,
  }
  const Q = quantile(preset.error_ratio, preset.clause, t)
  return t.calc(allowedRms, t.leaf(about, preset.randomPeak!.value), rates.UI!, Q)
}

/** Q of an error ratio [1], one-sided, written down as a procedure. */
export function quantile(error_ratio: number, source: string, t: Trace): number {
  const Q = upperTailInverse(error_ratio)
  if (!t.recording) return Q
  const about = { symbol: 'BER', meaning: 'error ratio of the total jitter', unit: '1', source }
  const p = source === 'this scenario' ? error_ratio : t.leaf(about, error_ratio)
  return t.kernel(NORMAL, Q, { BER: p })
}

const NORMAL = {
  symbol: 'Q',
  meaning: 'deviations of a normal variable that this probability exceeds, one-sided',
  unit: '1',
  source: 'M. Abramowitz, I. Stegun, Handbook of Mathematical Functions, 1964, chapter 26',
  method: 'Newton steps on the logarithm of the normal tail',
  error: '1e-12 relative',
}
