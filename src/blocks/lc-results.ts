import { formula } from '../derivation/formula.ts'
import type { Bench } from './bench.ts'
import { deviceResults, notedDesignDensity } from './design-point.ts'
import {
  amplitudeRoom,
  complementaryCurrentForAmplitude,
  currentForAmplitude,
  statedAmplitude,
} from './lc-amplitude.ts'
import { fixedShareAt, type LcOscillator, sideEfficiency, startUpTransconductance } from './lc-start-up.ts'
import { highEndQuality, lowEndQuality, tankResistance } from './lc-tank.ts'
import type { NamedResult } from './sub-block.ts'

/** V0 = 0.8 V0_limit. V0_limit [V] → [V]. */
export const plannedAmplitude = formula(
  {
    symbol: 'V0',
    meaning: 'amplitude planned for: a fifth below the supply limit',
    unit: 'V',
    source: 'common practice, no source',
  },
  (V0_limit) => 0.8 * V0_limit,
)

/** I = 2 g_m/(g_m/I_D): both sides at start-up. g_m_start [S], gm_ID [1/V] → [A]. */
export const startUpCurrent = formula(
  { symbol: 'I_start', meaning: 'current that starts the oscillator', unit: 'A', source: 'definition' },
  (g_m_start, gm_ID) => (2 * g_m_start) / gm_ID,
)

/** W = I/(2 J): one device of the pair. I [A], J [A/m] → [m]. */
export const pairWidth = formula(
  { symbol: 'W', meaning: 'width of each device of the pair', unit: 'm', source: 'definition' },
  (I, J) => I / (2 * J),
)

const NAMES = [
  ['tank.Q_low_end', '1'],
  ['tank.Q_high_end', '1'],
  ['tank.inductance_H', 'H'],
  ['tank.capacitance_F', 'F'],
  ['tank.resistance_ohm', 'ohm'],
  ['tank.device_share', '1'],
  ['tank.bank_ratio', '1'],
  ['range_ratio', '1'],
  ['current_A', 'A'],
  ['amplitude_V', 'V'],
  ['width_m', 'm'],
] as const

/** Tank, current, amplitude and width at the design point, beside the device itself. */
export function oscillatorResults(state: LcOscillator, bench: Bench): readonly NamedResult[] {
  const { speed, nmos, V_S } = state
  const device = deviceResults('lc_oscillator', speed, nmos, 1, V_S, bench)
  const J = notedDesignDensity(speed, bench.guard, bench.t)
  const values = J === null ? null : valuesAt(state, J, bench)
  const own = NAMES.map(([name, unit], k) => ({
    name: `lc_oscillator.${name}`,
    value: values === null ? null : values[k]!,
    unit,
    ...(values === null ? { reason: 'no operating point' } : {}),
  }))
  return [...device, ...own]
}

/** Values in the order of the names. The current must hold the amplitude down to the low end of the range. */
function valuesAt(state: LcOscillator, J: number, bench: Bench): readonly number[] {
  const { t } = bench
  const { tank, demand, speed, nmos, pmos } = state
  const { amplitude, current, startup_gain } = tank.oscillator
  const s_f = fixedShareAt(tank, demand.kappa, speed.stage.speed(J, t), t)
  const [Q_lo, Q_hi] = [lowEndQuality(tank, s_f, t), highEndQuality(tank, s_f, t)]
  const R_lo = t.calc(tankResistance, Q_lo, tank.f_lo, tank.L_d)
  const stated = amplitude !== null || current !== null
  const V0 = stated ? statedAmplitude(state, J, bench) : t.calc(plannedAmplitude, amplitudeRoom(state, bench))
  const law = pmos === null ? currentForAmplitude : complementaryCurrentForAmplitude
  const g_m = t.calc(startUpTransconductance, startup_gain, Q_lo, tank.f_lo, tank.L_d)
  const I_start = t.calc(startUpCurrent, g_m, sideEfficiency(nmos, pmos, J, t))
  const I = current ?? Math.max(I_start, t.calc(law, V0, R_lo))
  return [
    Q_lo,
    Q_hi,
    tank.L_d,
    demand.C_t,
    t.calc(tankResistance, Q_hi, tank.f_max, tank.L_d),
    s_f - tank.s_0,
    tank.rho,
    tank.x,
    I,
    V0,
    t.calc(pairWidth, I_start, J),
  ]
}
