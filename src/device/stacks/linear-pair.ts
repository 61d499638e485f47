import { formula } from '../../derivation/formula.ts'
import { PLAIN, type Trace } from '../../derivation/trace.ts'
import { chargeAt } from '../charge.ts'
import type { DeviceHere } from '../conditions.ts'
import { speedAt, transconductanceAt } from '../speed.ts'
import type { Stage } from '../stage.ts'
import { GAIN_FLOOR, gateVoltageOf, saturationVoltageAt, saturationVoltageOf } from '../voltage.ts'
import { largerOfTwo, linearInput, linearOutput, swingOfLinearGain } from './lines.ts'

/** V_sw = max(V_sw0, V_lin/(2 η)). V_sw0 [V] stated swing, V_lin [V] differential peak to peak, eta [1] usable share → [V]. */
export const linearSwing = formula(
  {
    symbol: 'V_sw',
    meaning: 'single-ended swing I R that keeps the stage linear',
    unit: 'V',
    source: 'common practice, no source: level mismatch 0.95 or better',
  },
  (V_sw0, V_lin, eta) => Math.max(V_sw0, V_lin / (2 * eta)),
)

/** V_pk = V_lin/(4 A): single-ended peak input, with the lowest gain that lifts a signal to V_lin. V_lin [V], A [1] → [V]. */
export const peakInput = formula(
  { symbol: 'V_pk', meaning: 'single-ended peak input', unit: 'V', source: 'definition' },
  (V_lin, A) => V_lin / (4 * A),
)

/** What a linear pair with split tails is asked to do; as chosen by {@link linearSwing} and {@link peakInput}. */
export interface LinearPair {
  readonly device: DeviceHere
  readonly V_sw: number
  readonly V_lin: number
  readonly V_pk: number
  readonly A: number
  readonly V_tail: number
}

/**
 * A linear differential pair (equaliser, variable-gain amplifier), each half on its own tail source, fed by a
 * like stage whose output rests at V − V_sw/2.
 *
 * J is the quiescent current per width. Own saturation asks that the largest output and input excursions
 * together, V_lin/4 + V_pk, stay below V_GS − V_DSsat: the full swing I R is never reached by a linear stage.
 *
 * @param pair device, swings [V], gain at the peak [1], tail voltage [V]
 * @returns the stage: supply it needs [V], speed f_T,int at J [Hz]
 */
export function linearPair(pair: LinearPair): Stage {
  const { device, V_sw, V_lin, V_pk, A, V_tail } = pair
  const lines = (J: number, t: Trace): readonly [number, number] => {
    const charge = chargeAt(device, J, t)
    const V_DSsat = saturationVoltageOf(device, J, charge, t.leaf(GAIN_FLOOR, GAIN_FLOOR.value), t)
    return [
      t.calc(linearInput, gateVoltageOf(device, J, charge, V_tail, t), V_tail, V_pk, V_sw),
      t.calc(linearOutput, V_tail, V_DSsat, V_sw, V_lin),
    ]
  }
  const excursion = V_lin / 4 + V_pk
  const swing = (J: number, t: Trace): number =>
    t.calc(swingOfLinearGain, A, J, transconductanceAt(device, J, t))
  return {
    J_low: 0.01 * (device.I_spec / device.of.L),
    J_lim: device.J_lim,
    gainSwing: V_sw,
    ownSwing: excursion,
    supplyNeeded: (J, t) => t.calc(largerOfTwo, ...lines(J, t)),
    bindingAt: (J) => {
      const [input, output] = lines(J, PLAIN)
      return input >= output ? 'input' : 'output'
    },
    swingNeeded: swing,
    swingSpare: (J) => V_sw - swing(J, PLAIN),
    ownSpare: (J) => {
      const V_GS = gateVoltageOf(device, J, chargeAt(device, J, PLAIN), V_tail, PLAIN)
      return V_GS - saturationVoltageAt(device, J, GAIN_FLOOR.value, PLAIN) - excursion
    },
    speed: (J, t) => speedAt(device, J, t).f_T_int,
    givens: { V_sw, A, V_lin },
  }
}
