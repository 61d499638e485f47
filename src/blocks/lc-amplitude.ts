import { formula } from '../derivation/formula.ts'
import { marginAtMost } from '../derivation/margin.ts'
import { type Bench, type Case, nominalStackSupply } from './bench.ts'
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

/** Largest amplitude [V] that supply and tail leave. */
export function amplitudeRoom({ pmos, speed, V_S }: LcOscillator, { t }: Bench): number {
  return t.calc(pmos === null ? amplitudeLimit : complementaryAmplitudeLimit, speed.V, V_S)
}

/** The amplitude [V] that the scenario fixes, or that its current gives at the highest frequency; J [A/m] of the pair. */
export function statedAmplitude(state: LcOscillator, J: number, bench: Bench): number {
  const { t } = bench
  const { tank, demand, speed, pmos } = state
  const { amplitude, current } = tank.oscillator
  if (amplitude !== null) return amplitude
  const s_f = fixedShareAt(tank, demand.kappa, speed.stage.speed(J, t), t)
  const R_p = t.calc(tankResistance, highEndQuality(tank, s_f, t), tank.f_max, tank.L_d)
  const law = pmos === null ? amplitudeOfCurrent : complementaryAmplitudeOfCurrent
  return t.calc(law, current!, R_p, amplitudeRoom(state, bench))
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

function peakOutcome(state: LcOscillator, bench: Bench): Outcome {
  const { speed, pmos, V_high } = state
  const { J, binding } = speed.capability
  if (J === null) return { ...derivedRoute(speed, bench.t), basis: binding }
  const limit = bench.node.supply.peak_limit
  const law = pmos === null ? peakVoltage : complementaryPeakVoltage
  const actual = bench.t.calc(law, V_high, statedAmplitude(state, J, bench))
  return {
    required: limit,
    available: actual,
    margin: bench.t.calc(marginAtMost, limit, actual),
    basis: 'peak limit of the node',
    supply: V_high,
  }
}

/** The node states a peak limit for its core devices only. */
function coreDevices({ settings, node }: Case): boolean {
  const chosen = nominalStackSupply(settings, node)
  return !('missing' in chosen) && chosen.device === node.nmos
}

/** Checks of the amplitude. A current beyond the supply limit only clips, so the limit judges a stated amplitude. */
export const AMPLITUDE_CHECKS: readonly CheckSpec<LcOscillator>[] = [
  {
    name: 'amplitude',
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
    asked: (given) => {
      const { amplitude, current } = given.settings.oscillator!
      return (amplitude !== null || current !== null) && coreDevices(given)
    },
    evaluate: peakOutcome,
  },
]
