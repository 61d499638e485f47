import type { Bench } from '../../blocks/bench.ts'
import type { RouteOutcome } from '../../blocks/sub-block.ts'
import { formula } from '../../derivation/formula.ts'
import { type ClockLoop, clockLoopAt } from '../loop/clock-loop.ts'
import { closedLoopOver } from '../loop/transfer.ts'
import { toneJitter } from '../noise/supply.ts'
import { recoveryJitter, SENSITIVITY, spurJitter, supplyJitter } from '../path/bounded.ts'
import { REPEATER_GATES, repeaterDelay } from '../path/buffer-jitter.ts'
import { type ClockPath, clockPathAt } from '../path/clock-path.ts'

/** Every line of a jitter budget. Times in seconds. */
export interface BudgetLines {
  readonly loop: ClockLoop
  readonly path: ClockPath
  /** Random, rms: loop, path, both together, and with the sampler's aperture. */
  readonly sigma_tx: number
  readonly sigma_all: number
  /** Bounded, peak to peak, by line; null where the scenario has no such line. */
  readonly J_supply: number
  readonly J_driver: number | null
  readonly J_spur: number | null
  readonly J_tone: number | null
  readonly J_rec: number | null
  /** Bounded, peak to peak: of the transmitter as a standard measures it, and of the whole path. */
  readonly DJ_tx: number
  readonly DJ_all: number
}

export type LinesFound =
  | BudgetLines
  | { readonly unknown: string }
  | { readonly short: RouteOutcome & { readonly margin: number }; readonly binding: string }

/** σ² = σ_pll² + σ_ck². sigma_pll [s], sigma_ck [s] → [s]. */
export const clockJitter = formula(
  {
    symbol: 'sigma_tx',
    meaning: 'random jitter of loop and clock path, rms',
    unit: 's',
    source: 'law: independent sources add in square',
  },
  (sigma_pll, sigma_ck) => Math.sqrt(sigma_pll ** 2 + sigma_ck ** 2),
)

/** σ² = σ_tx² + σ_ap². sigma_tx [s], sigma_ap [s] → [s]. */
export const sampledJitter = formula(
  {
    symbol: 'sigma_all',
    meaning: "random jitter with the sampler's aperture, rms",
    unit: 's',
    source: 'law: independent sources add in square',
  },
  (sigma_tx, sigma_ap) => Math.sqrt(sigma_tx ** 2 + sigma_ap ** 2),
)

/** DJ = J_supply + J_driver + J_spur + J_tone. J_supply [s], J_driver [s], J_spur [s], J_tone [s] → [s]. */
export const boundedSum = formula(
  {
    symbol: 'DJ_tx',
    meaning: 'bounded jitter of clock and transmitter, peak to peak',
    unit: 's',
    source: 'INCITS MJSQ, TR-35-2004: bounded terms in dual-Dirac form add',
  },
  (J_supply, J_driver, J_spur, J_tone) => J_supply + J_driver + J_spur + J_tone,
)

/** DJ_all = DJ_tx + J_rec. DJ_tx [s], J_rec [s] → [s]. */
export const recoveredSum = formula(
  {
    symbol: 'DJ_all',
    meaning: 'bounded jitter of the whole path, peak to peak',
    unit: 's',
    source: 'INCITS MJSQ, TR-35-2004: bounded terms in dual-Dirac form add',
  },
  (DJ_tx, J_rec) => DJ_tx + J_rec,
)

const NONE = (symbol: string, meaning: string) => ({ symbol, meaning, unit: 's', source: 'definition' })
const NO_DRIVER = NONE('J_driver', 'a clock block has no output driver')
const NO_SPUR = NONE('J_spur', 'the scenario states no reference spur')
const NO_TONE = NONE('J_tone', 'the scenario states no tone on the supply')
const NO_RECOVERY = NONE('J_rec', 'no interpolator places the sampling clock')

/** Random and bounded jitter of a case at its operating point, line by line. */
export function budgetLinesAt(bench: Bench): LinesFound {
  const loop = bench.once(clockLoopAt)
  if (!('sources' in loop)) return loop
  const path = clockPathAt(bench, loop.sources)
  if ('unknown' in path) return path
  const { t, block, settings, rates } = bench
  const link = block === 'link'
  const sigma_tx = t.calc(clockJitter, loop.sigma, path.sigma)
  const J_driver = link ? driverJitter(bench, loop) : null
  const { reference_spur } = settings.loop!
  const J_spur =
    reference_spur === null ? null : t.calc(spurJitter, reference_spur, loop.sources.oscillator.f_0)
  const J_tone = toneAt(bench, loop)
  const { interpolator, hunting_steps, interpolator_steps, aperture } = settings.receiver
  const J_rec =
    link && interpolator === 'yes'
      ? t.calc(recoveryJitter, hunting_steps, rates.UI!, interpolator_steps)
      : null
  const DJ_tx = t.calc(
    boundedSum,
    path.J_supply,
    J_driver ?? t.leaf(NO_DRIVER, 0),
    J_spur ?? t.leaf(NO_SPUR, 0),
    J_tone ?? t.leaf(NO_TONE, 0),
  )
  return {
    loop,
    path,
    sigma_tx,
    sigma_all: link ? t.calc(sampledJitter, sigma_tx, aperture) : sigma_tx,
    J_supply: path.J_supply,
    J_driver,
    J_spur,
    J_tone,
    J_rec,
    DJ_tx,
    DJ_all: link ? t.calc(recoveredSum, DJ_tx, J_rec ?? t.leaf(NO_RECOVERY, 0)) : DJ_tx,
  }
}

const ONE_STAGE = {
  symbol: 'n_path',
  meaning: 'stages of the output driver that the ripple delays',
  unit: '1',
  source: 'definition',
}

/** Ripple on the output driver and its pre-driver. */
function driverJitter({ t, settings, stack, V_core }: Bench, { sources }: ClockLoop): number {
  const series = settings.transmitter.kind === 'source-series'
  const about = SENSITIVITY[series ? 'source-series' : 'CML']
  const t_d = t.calc(repeaterDelay, t.leaf(REPEATER_GATES, REPEATER_GATES.value), sources.FO4)
  const V = series || stack.missing !== undefined ? V_core : stack.V
  return t.calc(
    supplyJitter,
    t.leaf(ONE_STAGE, 1),
    t_d,
    t.leaf(about, about.value),
    settings.clock.supply_ripple,
    V,
  )
}

function toneAt({ t, settings }: Bench, loop: ClockLoop): number | null {
  const tone = settings.clock.supply_tone
  if (tone === null) return null
  const { kind, r, f_ref } = loop.problem
  const { high } = closedLoopOver([tone.frequency], { kind, f_c: loop.f_c, r, f_ref })
  const E_m = t.kernel(TRANSFER, Math.sqrt(high[0]!), {
    f_m: tone.frequency,
    f_c: loop.f_c,
    ...(kind === 'type-II' ? { r_b: r, f_ref } : {}),
  })
  const { K_push, oscillator } = loop.sources
  const seen = t.calc(toneJitter, K_push, tone.amplitude, E_m, tone.frequency, oscillator.f_0)
  return loop.f_CDR === null ? seen : t.calc(trackedTone, seen, tone.frequency, loop.f_CDR)
}

/** J = J_seen f_m/√(f_m² + f_CDR²): what a receiver that follows slow jitter is left with. J_seen [s], f_m [Hz], f_CDR [Hz] → [s]. */
export const trackedTone = formula(
  {
    symbol: 'J_tone',
    meaning: 'jitter of the tone on the supply behind the tracking receiver, peak to peak',
    unit: 's',
    source: 'circuit theory: high-pass of first order',
  },
  (J_seen, f_m, f_CDR) => (J_seen * f_m) / Math.sqrt(f_m ** 2 + f_CDR ** 2),
)

const TRANSFER = {
  symbol: 'E_m',
  meaning: 'share of a tone that the loop leaves, |1 − H|',
  unit: '1',
  source: 'F. M. Gardner, Phaselock Techniques, 3rd ed., 2005',
  method: 'closed loop at the frequency of the tone',
  error: 'rounding',
}
