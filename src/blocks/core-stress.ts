import { marginAtMost } from '../derivation/margin.ts'
import { type Bench, type Case, highestSupplyVoltage } from './bench.ts'
import type { CheckSpec, Outcome } from './sub-block.ts'

/** Full-swing and complementary stages on a core supply that is lifted above what the node's devices stand. */

const nominalCore = ({ settings, node }: Case): number => settings.supply.core_voltage ?? node.supply.core

/** Whether the core supply of a case runs above the device limit. */
export function coreRunsHigh(given: Case): boolean {
  const { settings, node } = given
  const tolerance = settings.supply.tolerance ?? node.supply.tolerance
  return nominalCore(given) * (1 + tolerance) > node.supply.device_limit
}

/** The stress check of such a stage: the device that is off, or fully on, stands the whole supply V_high [V]. */
export function wholeSupplyOutcome(V_high: number, { t, node }: Bench): Outcome {
  const limit = node.supply.device_limit
  return {
    required: limit,
    available: V_high,
    margin: t.calc(marginAtMost, limit, V_high),
    basis: 'device limit of the node; the whole supply stands across one device',
  }
}

/** The stress check of a sub-block whose devices stand on the core supply; `of` says when it has such devices. */
export function coreStressCheck(
  title: string,
  of: (given: Case) => boolean = () => true,
): CheckSpec<unknown> {
  return {
    name: 'core_stress',
    title: `${title}: device stress on the core supply`,
    quantity: 'drain–source voltage',
    unit: 'V',
    sense: 'at most',
    asked: (given) => of(given) && coreRunsHigh(given),
    evaluate: (_, bench) => coreStressOutcome(bench),
  }
}

/** As above, on the core supply. */
export function coreStressOutcome(bench: Bench): Outcome {
  const V_high = bench.t.calc(highestSupplyVoltage, nominalCore(bench), bench.at.tol_V)
  return { ...wholeSupplyOutcome(V_high, bench), supply: bench.V_core }
}
