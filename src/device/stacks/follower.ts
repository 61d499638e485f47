import { formula } from '../../derivation/formula.ts'
import type { DeviceHere } from '../conditions.ts'
import { speedAt } from '../speed.ts'
import { NO_LINE, type Stage } from '../stage.ts'
import { gateVoltageAt } from '../voltage.ts'
import { followerInput } from './lines.ts'

/** V_S = V_tail + V_swing. V_tail [V], V_swing [V] → [V]. */
export const raisedSource = formula(
  { symbol: 'V_S', meaning: 'source of the follower at its highest input', unit: 'V', source: 'definition' },
  (V_tail, V_swing) => V_tail + V_swing,
)

/** A source follower: device, tail voltage, full single-ended swing and reserve, all in V. */
export interface Follower {
  readonly device: DeviceHere
  readonly V_tail: number
  readonly V_swing: number
  readonly V_m: number
}

/**
 * A source follower such as the buffer behind a track-and-hold; its highest input is the supply.
 *
 * @param follower device, tail voltage [V], full swing [V], reserve [V]
 * @returns the stage: supply it needs [V], speed f_T,int at J [Hz]
 */
export function sourceFollower({ device, V_tail, V_swing, V_m }: Follower): Stage {
  return {
    J_low: 0.01 * (device.I_spec / device.of.L),
    J_lim: device.J_lim,
    gainSwing: V_swing,
    ownSwing: V_swing,
    // At its highest input the source stands a full swing above the tail, and so does its body effect.
    supplyNeeded: (J, t) => {
      const V_S = t.calc(raisedSource, V_tail, V_swing)
      return t.calc(followerInput, gateVoltageAt(device, J, V_S, t), V_tail, V_swing, V_m)
    },
    bindingAt: () => 'follower',
    swingSpare: NO_LINE,
    ownSpare: NO_LINE,
    speed: (J, t) => speedAt(device, J, t).f_T_int,
    givens: { V_tail, V_m },
  }
}
