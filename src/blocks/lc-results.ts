import { formula } from '../derivation/formula.ts'
import type { Bench } from './bench.ts'
import { deviceResults, notedDesignDensity } from './design-point.ts'
import { coreAt } from './lc-core.ts'
import type { LcOscillator } from './lc-start-up.ts'
import { highEndQuality, tankResistance } from './lc-tank.ts'
import type { NamedResult } from './sub-block.ts'

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

/** Values in the order of the names. */
function valuesAt(state: LcOscillator, J: number, bench: Bench): readonly number[] {
  const { t } = bench
  const { tank, demand } = state
  const { s_f, Q_lo, V0, I_start, I } = coreAt(state, J, bench)
  const Q_hi = highEndQuality(tank, s_f, t)
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
