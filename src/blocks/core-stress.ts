import { marginAtMost } from '../derivation/margin.ts'
import { type Bench, type Case, highestSupplyVoltage } from './bench.ts'
import type { Outcome } from './sub-block.ts'

/** Full-swing and complementary stages on a core supply that is lifted above what the node's devices stand. */

const nominalCore = ({ settings, node }: Case): number => settings.supply.core_voltage ?? node.supply.core

/** Whether the core supply of a case runs above the device limit. */
export function coreRunsHigh(given: Case): boolean {
  const { settings, node } = given
  const tolerance = settings.supply.tolerance ?? node.supply.tolerance
  return nominalCore(given) * (1 + tolerance) > node.supply.device_limit
}

/** The stress check of such a stage: the device that is off, or fully on, stands the whole supply. */
export function coreStressOutcome(bench: Bench): Outcome {
  const { t, at, node, V_core } = bench
  const limit = node.supply.device_limit
  const stress = t.calc(highestSupplyVoltage, nominalCore(bench), at.tol_V)
  return {
    required: limit,
    available: stress,
    margin: t.calc(marginAtMost, limit, stress),
    basis: 'device limit of the node; the whole core supply stands across one device',
    supply: V_core,
  }
}
