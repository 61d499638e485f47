import { PLAIN } from '../derivation/trace.ts'
import { capability } from '../device/available.ts'
import { cornerPoint, deviceAt, type OperatingPoint } from '../device/conditions.ts'
import { tailVoltage } from '../device/stacks/lines.ts'
import { switchedPair } from '../device/stacks/switched-pair.ts'
import { SWITCH_FLOOR } from '../device/voltage.ts'
import type { NodeValues } from '../nodes/keys.ts'

/** The stage by which nodes are compared: tail and switched pair, dc-coupled to a like stage. Common practice. */
const STAGE = { V_sw: 0.3, A: 1.4, V_m: 0.05, V_t0: 0.12, ageing: 0.025, T: [233.15, 398.15] } as const

/**
 * Device speed that a stacked stage has at core supply, at the worst corner and end of −40 … 125 °C.
 *
 * @param node its values, SI
 * @returns f_T,int at half the tail current [Hz], or null where some corner has no operating point
 */
export function stackedStageSpeed(node: NodeValues): number | null {
  let least = Number.POSITIVE_INFINITY
  for (const corner of ['slow', 'typical', 'fast'] as const) {
    for (const T of STAGE.T) {
      const at = cornerPoint(node, corner, T, node.supply.tolerance, STAGE.ageing)
      const speed = speedAtPoint(node, at)
      if (speed === null) return null
      least = Math.min(least, speed)
    }
  }
  return least
}

function speedAtPoint(node: NodeValues, at: OperatingPoint): number | null {
  const device = deviceAt(node.nmos, at, PLAIN)
  const stage = switchedPair({
    device,
    V_sw: STAGE.V_sw,
    V_sw_in: STAGE.V_sw,
    A: STAGE.A,
    V_m: STAGE.V_m,
    V_tail: tailVoltage.run(STAGE.V_t0, device.U_T),
    coupling: 'dc',
    clockPairBelow: false,
    c_sat: SWITCH_FLOOR.value,
    ownSaturation: true,
  })
  const { J } = capability(stage, node.supply.core * (1 - at.tol_V), PLAIN)
  return J === null ? null : stage.speed(J, PLAIN)
}
