import { formula } from '../derivation/formula.ts'
import { marginAtMost } from '../derivation/margin.ts'
import type { Bench } from './bench.ts'
import { momentaryLimit, NO_LIMIT } from './device-limits.ts'
import { fixedShareAt, type LcOscillator } from './lc-start-up.ts'
import { highEndQuality, tankResistance } from './lc-tank.ts'
import { derivedRoute } from './stage-speed.ts'
import type { CheckSpec, Outcome } from './sub-block.ts'

/** How large an LC oscillator may and does swing. Amplitudes are differential and peak. */

const SUPPLY = 'derived: neither side may leave what the supply and the tail allow'
const SWITCHED = 'T. H. Lee, A. Hajimiri, IEEE JSSC 35(3), 2000: fundamental of a switched current'

/** V0 ≤ 2(V − V_tail): nMOS pair, tank fed from the supply. V [V] lowest supply, V_tail [V] → [V]. */
export const amplitudeLimit = formula(
  { symbol: 'V0_limit', meaning: 'largest amplitude under the supply', unit: 'V', source: SUPPLY },
  (V, V_tail) => 2 * Math.max(0 * V, V - V_tail),
)

/** V0 ≤ V − V_tail: complementary pairs. V [V] lowest supply, V_tail [V] → [V]. */
export const complementaryAmplitudeLimit = formula(
  { symbol: 'V0_limit', meaning: 'largest amplitude under the supply', unit: 'V', source: SUPPLY },
  (V, V_tail) => Math.max(0 * V, V - V_tail),
)

/** V0 = min(2 I R_p/π, V0_limit): nMOS pair. I_osc [A], R_p [Ω], V0_limit [V] → [V]. */
export const amplitudeOfCurrent = formula(
  { symbol: 'V0', meaning: 'amplitude that the current gives', unit: 'V', source: SWITCHED },
  (I_osc, R_p, V0_limit) => Math.min((2 * I_osc * R_p) / Math.PI, V0_limit),
)

/** V0 = min(4 I R_p/π, V0_limit): complementary pairs. I_osc [A], R_p [Ω], V0_limit [V] → [V]. */
export const complementaryAmplitudeOfCurrent = formula(
  { symbol: 'V0', meaning: 'amplitude that the current gives', unit: 'V', source: SWITCHED },
  (I_osc, R_p, V0_limit) => Math.min((4 * I_osc * R_p) / Math.PI, V0_limit),
)

/** I = π V0/(2 R_p): nMOS pair. V0 [V], R_p [Ω] → [A]. */
export const currentForAmplitude = formula(
  { symbol: 'I_osc', meaning: 'current that gives the amplitude', unit: 'A', source: SWITCHED },
  (V0, R_p) => (Math.PI * V0) / (2 * R_p),
)

/** I = π V0/(4 R_p): complementary pairs. V0 [V], R_p [Ω] → [A]. */
export const complementaryCurrentForAmplitude = formula(
  { symbol: 'I_osc', meaning: 'current that gives the amplitude', unit: 'A', source: SWITCHED },
  (V0, R_p) => (Math.PI * V0) / (4 * R_p),
)

/** V_pk = V_high + V0/2: a side of a tank fed from the supply. V_high [V] highest supply, V0 [V] → [V]. */
export const peakVoltage = formula(
  { symbol: 'V_pk', meaning: 'peak voltage of an oscillating node', unit: 'V', source: SUPPLY },
  (V_high, V0) => V_high + V0 / 2,
)

/** V_pk = V_high/2 + V0/2: a side of a tank between complementary pairs. V_high [V], V0 [V] → [V]. */
export const complementaryPeakVoltage = formula(
  { symbol: 'V_pk', meaning: 'peak voltage of an oscillating node', unit: 'V', source: SUPPLY },
  (V_high, V0) => V_high / 2 + V0 / 2,
)

/** V_room = 2(V_peak − V_high): amplitude up to the peak limit, tank fed from the supply. V_peak [V], V_high [V] → [V]. */
export const peakRoom = formula(
  { symbol: 'V_room', meaning: 'amplitude that the peak limit leaves', unit: 'V', source: SUPPLY },
  (V_peak, V_high) => 2 * (V_peak - V_high),
)

/** V_room = 2 V_peak − V_high: the same between complementary pairs. V_peak [V], V_high [V] → [V]. */
export const complementaryPeakRoom = formula(
  { symbol: 'V_room', meaning: 'amplitude that the peak limit leaves', unit: 'V', source: SUPPLY },
  (V_peak, V_high) => 2 * V_peak - V_high,
)

const PLANNED = 'common practice, no source'

/** V_least = 0.2 V0_limit: an amplitude below which no oscillator is planned. V0_limit [V] → [V]. */
export const leastAmplitude = formula(
  { symbol: 'V_least', meaning: 'least amplitude that is planned for', unit: 'V', source: PLANNED },
  (V0_limit) => 0.2 * V0_limit,
)

/** V0 = max(V_least, min(0.8 V0_limit, V_room)): a fifth below the supply limit, inside the peak limit. V_least [V], V0_limit [V], V_room [V] → [V]. */
export const plannedAmplitude = formula(
  {
    symbol: 'V0',
    meaning: 'amplitude planned for: a fifth below the supply limit, and within the peak limit',
    unit: 'V',
    source: PLANNED,
  },
  (V_least, V0_limit, V_room) => Math.max(V_least, Math.min(0.8 * V0_limit, V_room)),
)

/** Largest amplitude [V] that supply and tail leave, at the lowest supply unless another is given [V]. */
export function amplitudeRoom({ pmos, speed, V_S }: LcOscillator, { t }: Bench, V = speed.V): number {
  return t.calc(pmos === null ? amplitudeLimit : complementaryAmplitudeLimit, V, V_S)
}

/** The amplitude [V] that is planned where the scenario states neither amplitude nor current. */
export function amplitudePlanned(state: LcOscillator, bench: Bench): number {
  const { t } = bench
  const V0_limit = amplitudeRoom(state, bench)
  const V_least = t.calc(leastAmplitude, V0_limit)
  const V_peak = momentaryLimit(bench, t)
  const room = state.pmos === null ? peakRoom : complementaryPeakRoom
  const V_room = V_peak === null ? t.leaf(NO_PEAK, V0_limit) : t.calc(room, V_peak, state.V_high)
  return t.calc(plannedAmplitude, V_least, V0_limit, V_room)
}

const NO_PEAK = {
  symbol: 'V_room',
  meaning: 'no peak limit is known, so the supply alone limits the amplitude',
  unit: 'V',
  source: 'method of this planner',
}

/**
 * The amplitude [V] that the scenario fixes, or that its current gives at the highest frequency.
 *
 * @param state the oscillator
 * @param J current per width of the pair [A/m]
 * @param bench the case at its operating point
 * @param V supply that clips it [V]: the lowest where noise counts, the highest where stress does
 */
export function statedAmplitude(
  state: LcOscillator,
  J: number,
  bench: Bench,
  V: number = state.speed.V,
): number {
  const { t } = bench
  const { tank, demand, speed, pmos } = state
  const { amplitude, current } = tank.oscillator
  if (amplitude !== null) return amplitude
  const s_f = fixedShareAt(tank, demand.kappa, speed.stage.speed(J, t), t)
  const R_p = t.calc(tankResistance, highEndQuality(tank, s_f, t), tank.f_max, tank.L_d)
  const law = pmos === null ? amplitudeOfCurrent : complementaryAmplitudeOfCurrent
  return t.calc(law, current!, R_p, amplitudeRoom(state, bench, V))
}

function amplitudeOutcome(state: LcOscillator, bench: Bench): Outcome {
  const limit = amplitudeRoom(state, bench)
  const actual = state.tank.oscillator.amplitude!
  return {
    required: limit,
    available: actual,
    margin: bench.t.calc(marginAtMost, limit, actual),
    basis: 'lowest supply less the tail',
  }
}

/** A stated amplitude or current is judged as it is; a planned one by whether the least that is planned fits. */
function peakOutcome(state: LcOscillator, bench: Bench): Outcome {
  const { speed, pmos, V_high, tank } = state
  const { t } = bench
  const { J, binding } = speed.capability
  if (J === null) return { ...derivedRoute(speed, t), basis: binding }
  const limit = momentaryLimit(bench, t)
  if (limit === null) {
    return { required: null, available: null, margin: null, basis: 'not computed', reason: NO_LIMIT }
  }
  const stated = tank.oscillator.amplitude !== null || tank.oscillator.current !== null
  const V0 = stated
    ? statedAmplitude(state, J, bench, V_high)
    : t.calc(leastAmplitude, amplitudeRoom(state, bench))
  const actual = t.calc(pmos === null ? peakVoltage : complementaryPeakVoltage, V_high, V0)
  return {
    required: limit,
    available: actual,
    margin: t.calc(marginAtMost, limit, actual),
    basis: stated ? 'peak limit of the node' : 'peak limit of the node; least amplitude that is planned',
    supply: V_high,
  }
}

/** Checks of the amplitude. A current beyond the supply limit only clips, so the limit judges a stated amplitude. */
export const AMPLITUDE_CHECKS: readonly CheckSpec<LcOscillator>[] = [
  {
    name: 'amplitude',
    because: 'the scenario states no amplitude',
    title: 'LC oscillator: amplitude under the supply',
    quantity: 'differential amplitude',
    unit: 'V',
    sense: 'at most',
    asked: ({ settings }) => settings.oscillator?.amplitude != null,
    evaluate: amplitudeOutcome,
  },
  {
    name: 'peak_voltage',
    title: 'LC oscillator: peak device voltage',
    quantity: 'peak voltage',
    unit: 'V',
    sense: 'at most',
    evaluate: peakOutcome,
  },
]
