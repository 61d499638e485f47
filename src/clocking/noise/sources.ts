import type { Bench } from '../../blocks/bench.ts'
import type { RouteOutcome } from '../../blocks/sub-block.ts'
import { formula } from '../../derivation/formula.ts'
import type { Trace } from '../../derivation/trace.ts'
import { BOLTZMANN, deviceAt, typicalPoint } from '../../device/conditions.ts'
import { fo4At } from '../../device/fo4.ts'
import { filterNoise } from '../loop/filter.ts'
import type { Profile } from '../loop/problem.ts'
import { poleZeroRoot } from '../loop/shape.ts'
import { densityOf, multiplication, multiplied, multipliedBy, ONE_HERTZ } from './density.ts'
import { CARRIER, DETECTORS, detectorFlicker, detectorFloor, modulatorNoise, OFFSET } from './detector.ts'
import { GATE_LOAD, gateFloor, gateJitter, gateOverdrive, RETIMING } from './edges.ts'
import type { OscillatorNoise } from './lc-oscillator-noise.ts'
import { oscillatorNoise } from './oscillator-noise.ts'
import { PUSHING, pushedNoise, pushingOf } from './supply.ts'
import { tuningGain } from './tuning.ts'

/** Densities of all sources of a clock at the oscillator's frequency. SI. */
export interface Sources {
  readonly oscillator: OscillatorNoise
  /** Multiplication of the reference, and whether a modulator makes it. */
  readonly N: number
  readonly fractional: boolean
  /** Floor of the reference and of its buffers at the output [1/Hz]; the first is 0 when it is measured. */
  readonly A_ref: number
  readonly A_rb: number
  /** Measured reference and its factor. */
  readonly reference: Profile | null
  readonly N_sq: number
  /** Detector: floor [1/Hz] and density times offset [1]; 0 in a realigned oscillator, which has none. */
  readonly A_det: number
  readonly a_fl: number
  /** Divider [1/Hz] and modulator [1/Hz]. */
  readonly A_div: number
  readonly c_mod: number
  /** Measured oscillator and its factor. */
  readonly measured: Profile | null
  readonly scale: number
  /** Supply noise [Hz], pushing [Hz/V], tuning gain [Hz/V], filter resistor [1]. */
  readonly p_2: number
  readonly K_push: number
  readonly K_V: number
  readonly q_R: number
  /** Delay of a gate here [s] and its jitter on the load of a gate [s]. */
  readonly FO4: number
  readonly sigma_g: number
}

export type SourcesFound =
  | Sources
  | { readonly unknown: string }
  | { readonly short: RouteOutcome & { readonly margin: number }; readonly binding: string }

const NONE = (symbol: string, meaning: string, unit: string) => ({
  symbol,
  meaning,
  unit,
  source: 'definition',
})
const NO_DETECTOR = NONE('A_det', 'a realigned oscillator has no detector', '1/Hz')
const NO_FLICKER = NONE('a_fl', 'a realigned oscillator has no detector', '1')
const UNDIVIDED = NONE('A_div', 'a sub-sampling loop locks without a divider', '1/Hz')
const NOT_WHOLE =
  'a realigned oscillator follows a whole multiple of its reference: with a fraction its edges miss by up to a period, which is not modelled'
const NO_DIVIDER = NONE('A_div', 'a realigned oscillator has no divider in its loop', '1/Hz')
const NO_MODULATOR = NONE('c_mod', 'the ratio is whole, so there is no modulator', '1/Hz')
const NO_RESISTOR = NONE('q_R', 'a realigned oscillator has no loop filter', '1')
const IS_MEASURED = NONE('A_ref', 'the reference is given by its measured profile', '1/Hz')

const TYPICAL_300K = typicalPoint(300)

/** Offsets and densities of a measured table of [Hz, dBc/Hz]. */
export function profileOf(rows: readonly (readonly number[])[] | null): Profile | null {
  if (rows === null) return null
  return {
    offset: Float64Array.from(rows, ([f]) => f!),
    density: Float64Array.from(rows, ([, L]) => 10 ** (L! / 10)),
  }
}

/** A ratio counts as whole within this. */
const WHOLE = 1e-6

/**
 * Everything that makes the clock jitter, at one operating point.
 *
 * @param bench a case whose scenario states a loop
 * @returns densities, the reason why they are unknown, or the shortfall of the supply of the oscillator
 */
export function sourcesAt(bench: Bench): SourcesFound {
  const { settings, node, nmos, t, V_core, at } = bench
  const loop = settings.loop!
  const found = oscillatorNoise(bench)
  if (!('noise' in found)) return found
  const { noise } = found
  const N = t.calc(multiplication, noise.f_0, loop.reference)
  const fractional = loop.fractional === 'yes' || Math.abs(N - Math.round(N)) > WHOLE
  if (fractional && loop.kind === 'realigned') return { unknown: NOT_WHOLE }
  const FO4 = fo4At(node, nmos, deviceAt(node.nmos, TYPICAL_300K, t), V_core, t)
  const V_ov = t.calc(gateOverdrive, V_core, nmos.V_T, nmos.of.n, nmos.U_T)
  const C_L = t.leaf(GATE_LOAD, GATE_LOAD.value)
  const sigma_g = t.calc(gateJitter, FO4, V_core, BOLTZMANN.value, at.T, nmos.of.gamma, V_ov, C_L)
  const K_V = tuningGain(bench, noise.f_0)
  const K_push = pushingAt(bench, noise.f_0)
  const gates = (n: number): number => t.calc(gateFloor, n, loop.reference, sigma_g, N)
  const measured = profileOf(settings.oscillator!.phase_noise)
  return {
    oscillator: noise,
    N,
    fractional,
    ...referenceAt(bench, N),
    A_rb: gates(loop.reference_buffers),
    ...detectorAt(bench, noise.f_0, N, gates),
    measured,
    scale: measured === null ? 0 : t.calc(scaledBy, noise.f_0, settings.oscillator!.range[1]),
    p_2: t.calc(pushedNoise, settings.clock.regulator_noise, K_push),
    K_push,
    K_V,
    q_R:
      loop.kind === 'realigned'
        ? t.leaf(NO_RESISTOR, 0)
        : t.calc(filterNoise, BOLTZMANN.value, at.T, N, K_V, filterRoot(bench), loop.charge_pump_current),
    FO4,
    sigma_g,
  }
}

/** (f_0/f_max)²: a profile measured at the highest frequency, moved to that in use. f_0 [Hz], f_max [Hz] → [1]. */
export const scaledBy = formula(
  {
    symbol: 's_f0',
    meaning: 'factor on the density measured at the highest frequency',
    unit: '1',
    source: 'the same time is less phase at a lower frequency',
  },
  (f_0, f_max) => (f_0 / f_max) ** 2,
)

/** √b [1] of the filter that the scenario's phase margin asks for. */
export const filterRoot = ({ settings, t }: Bench): number =>
  t.calc(poleZeroRoot, settings.loop!.phase_margin)

function pushingAt({ settings, t }: Bench, f_0: number): number {
  const { pushing, kind } = settings.oscillator!
  if (pushing !== null) return pushing
  const about = PUSHING[kind === 'LC' ? 'LC' : 'ring']
  return t.calc(pushingOf, t.leaf(about, about.value), f_0)
}

function referenceAt({ settings, t }: Bench, N: number): Pick<Sources, 'A_ref' | 'reference' | 'N_sq'> {
  const { reference_noise, reference_floor } = settings.loop!
  const reference = profileOf(reference_noise)
  const N_sq = t.calc(multipliedBy, N)
  if (reference !== null) return { A_ref: t.leaf(IS_MEASURED, 0), reference, N_sq }
  const A = t.calc(densityOf, reference_floor, t.leaf(ONE_HERTZ, ONE_HERTZ.value))
  return { A_ref: t.calc(multiplied, A, N), reference, N_sq }
}

/** Retiming of the divider, or its stated floor; a sub-sampling loop locks without one. */
function dividerAt(
  { detector, divider_floor }: NonNullable<Bench['settings']['loop']>,
  N: number,
  gates: (n: number) => number,
  t: Trace,
): number {
  if (divider_floor !== null) {
    const B_1 = t.leaf(ONE_HERTZ, ONE_HERTZ.value)
    return t.calc(multiplied, t.calc(densityOf, divider_floor, B_1), N)
  }
  return detector === 'sub-sampling' ? t.leaf(UNDIVIDED, 0) : gates(t.leaf(RETIMING, RETIMING.value))
}

function detectorAt(
  { settings, t }: Bench,
  f_0: number,
  N: number,
  gates: (n: number) => number,
): Pick<Sources, 'A_det' | 'a_fl' | 'A_div' | 'c_mod'> {
  const loop = settings.loop!
  if (loop.kind === 'realigned') {
    return {
      A_det: t.leaf(NO_DETECTOR, 0),
      a_fl: t.leaf(NO_FLICKER, 0),
      A_div: t.leaf(NO_DIVIDER, 0),
      c_mod: t.leaf(NO_MODULATOR, 0),
    }
  }
  const B_1 = t.leaf(ONE_HERTZ, ONE_HERTZ.value)
  const { floor, flicker } = DETECTORS[loop.detector]
  const L_n = loop.floor ?? t.leaf(floor, floor.value)
  const L_nf = loop.flicker ?? t.leaf(flicker, flicker.value)
  const carrier = t.leaf(CARRIER, CARRIER.value)
  const whole = loop.fractional !== 'yes' && Math.abs(N - Math.round(N)) <= WHOLE
  return {
    A_det: t.calc(densityOf, t.calc(detectorFloor, L_n, N, loop.reference, B_1), B_1),
    a_fl: t.calc(detectorFlicker, t.calc(densityOf, L_nf, B_1), f_0, carrier, t.leaf(OFFSET, OFFSET.value)),
    A_div: dividerAt(loop, N, gates, t),
    c_mod: whole
      ? t.leaf(NO_MODULATOR, 0)
      : t.calc(modulatorNoise, loop.reference, loop.modulator_cancellation),
  }
}
