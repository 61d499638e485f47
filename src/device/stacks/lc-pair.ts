import type { Trace } from '../../derivation/trace.ts'
import type { DeviceHere } from '../conditions.ts'
import { complementarySpeed, effectiveSpeed, speedAt } from '../speed.ts'
import { NO_LINE, type Stage } from '../stage.ts'
import { gateVoltageAt } from '../voltage.ts'
import { complementaryStartUp, startUpVoltage } from './lines.ts'

/** A cross-coupled oscillator pair. V_tail is 0 without a tail source [V]. */
export interface CrossCoupled {
  readonly nmos: DeviceHere
  /** Present in a complementary oscillator. */
  readonly pmos: DeviceHere | null
  readonly V_tail: number
}

/**
 * The cross-coupled pair of an LC oscillator at start-up, where both devices rest at V_GS.
 *
 * J is the quiescent current per width; no saturation test applies, the amplitude is limited elsewhere.
 *
 * @param pair devices and tail voltage [V]
 * @returns the stage: supply it needs at start-up [V], speed f_T as laid out at J [Hz]
 */
export function lcPair({ nmos, pmos, V_tail }: CrossCoupled): Stage {
  const needed = (J: number, t: Trace): number => {
    const V_GS = gateVoltageAt(nmos, J, V_tail, t)
    if (pmos === null) return t.calc(startUpVoltage, V_GS, V_tail, nmos.U_T)
    return t.calc(complementaryStartUp, V_GS, gateVoltageAt(pmos, J, 0, t), V_tail, nmos.U_T)
  }
  return {
    J_low: 0.01 * (nmos.I_spec / nmos.of.L),
    J_lim: pmos === null ? nmos.J_lim : Math.min(nmos.J_lim, pmos.J_lim),
    gainSwing: 1,
    ownSwing: 1,
    supplyNeeded: needed,
    bindingAt: () => 'start-up voltage',
    swingSpare: NO_LINE,
    ownSpare: NO_LINE,
    speed: (J, t) =>
      pmos === null
        ? effectiveSpeed(nmos, speedAt(nmos, J, t), t)
        : complementarySpeed(nmos, pmos, J, J, true, t),
    givens: { V_tail },
  }
}
