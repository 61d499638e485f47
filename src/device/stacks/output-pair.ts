import { formula } from '../../derivation/formula.ts'
import { PLAIN, type Trace } from '../../derivation/trace.ts'
import { chargeAt } from '../charge.ts'
import type { DeviceHere } from '../conditions.ts'
import { speedAt, transconductanceAt } from '../speed.ts'
import { NO_LINE, type Stage } from '../stage.ts'
import { gateVoltageOf, saturationVoltageOf } from '../voltage.ts'
import { halfDensity, largerOfTwo, swingOfGain, switchedInput, switchedOutput } from './lines.ts'

/** V_low = 3 V_ppd/4: how far the low output lies below the supply. V_ppd [V] differential peak to peak → [V]. */
export const outputDrop = formula(
  {
    symbol: 'V_low',
    meaning: 'how far the low output lies below the supply',
    unit: 'V',
    source:
      'derived: behind ac coupling the mean current I/2 = V_ppd/(2 R0) flows in the near R0 alone, V_ppd/2, and the signal adds V_ppd/4',
  },
  (V_ppd) => (3 * V_ppd) / 4,
)

/** V_top = V_high − V_ppd/4: the high output at the highest supply. V_high [V], V_ppd [V] differential peak to peak → [V]. */
export const outputTop = formula(
  {
    symbol: 'V_top',
    meaning: 'high output at the highest supply',
    unit: 'V',
    source: 'derived: the outputs rest at V − V_ppd/2 behind ac coupling, and the signal adds V_ppd/4',
  },
  (V_high, V_ppd) => V_high - V_ppd / 4,
)

/** An output stage on terminations. Voltages in V. */
export interface OutputPair {
  readonly device: DeviceHere
  /** How far the low output lies below the supply. */
  readonly V_low: number
  /** Single-ended swing of the stage that drives it. */
  readonly V_sw_in: number
  /** How many times J/g_m the driving swing must be to switch the pair [1]. */
  readonly A: number
  readonly V_m: number
  readonly V_tail: number
  readonly c_sat: number
}

/**
 * A current-mode output stage: a switched pair on the terminations of both ends of the line.
 *
 * Its gates are level-shifted, so that the device that conducts stays saturated down to the low output: own
 * saturation is then the output line, and the crossing lies wherever the level shift puts it. J is the full tail
 * current per width of one device; speed is taken at J/2.
 *
 * @param pair device, voltages [V] and switching ratio
 * @returns the stage: supply it needs [V], speed f_T,int at J/2 [Hz]
 */
export function outputPair({ device, V_low, V_sw_in, A, V_m, V_tail, c_sat }: OutputPair): Stage {
  const lines = (J: number, t: Trace): readonly [number, number] => {
    const charge = chargeAt(device, J, t)
    const V_DSsat = saturationVoltageOf(device, J, charge, c_sat, t)
    return [
      t.calc(switchedInput, gateVoltageOf(device, J, charge, V_tail, t), V_tail, V_m),
      t.calc(switchedOutput, V_tail, V_DSsat, V_m, V_low),
    ]
  }
  const swing = (J: number, t: Trace): number =>
    t.calc(swingOfGain, A, J, transconductanceAt(device, t.calc(halfDensity, J), t))
  return {
    J_low: 0.01 * (device.I_spec / device.of.L),
    J_lim: device.J_lim,
    gainSwing: V_sw_in,
    ownSwing: V_sw_in,
    supplyNeeded: (J, t) => t.calc(largerOfTwo, ...lines(J, t)),
    bindingAt: (J) => {
      const [input, output] = lines(J, PLAIN)
      return input >= output ? 'switched input' : 'output'
    },
    swingNeeded: swing,
    swingSpare: (J) => V_sw_in - swing(J, PLAIN),
    ownSpare: NO_LINE,
    speed: (J, t) => speedAt(device, t.calc(halfDensity, J), t).f_T_int,
    c_sat,
    givens: { V_low, V_sw: V_sw_in, A, V_m },
  }
}
