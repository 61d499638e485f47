import { formula } from '../derivation/formula.ts'
import { marginAtMost } from '../derivation/margin.ts'
import { PLAIN } from '../derivation/trace.ts'
import { type Bench, type Case, nominalStackSupply } from './bench.ts'
import { continuousLimit, NO_LIMIT } from './device-limits.ts'
import { headroomOutcome, type StageSpeed, speedOutcome } from './stage-speed.ts'
import type { CheckSpec, Outcome } from './sub-block.ts'

/** A stacked stage: its speed question, its common source node [V] and its highest supply [V]. */
export interface Stacked {
  readonly speed: StageSpeed
  readonly V_S: number
  readonly V_high: number
  /** Source from which device stress is judged, where it is not the common source node [V]. */
  readonly V_off?: number
}

/** The three checks every stacked stage has: device speed, headroom and, on a lifted supply, device stress. */
export function stackChecks(title: string): readonly CheckSpec<Stacked>[] {
  return [
    {
      name: 'speed',
      title: `${title}: device speed`,
      quantity: 'device transit frequency',
      unit: 'Hz',
      sense: 'at least',
      evaluate: (state, bench) => speedOutcome(state.speed, bench),
    },
    {
      name: 'headroom',
      title: `${title}: headroom`,
      quantity: 'supply voltage',
      unit: 'V',
      sense: 'at least',
      evaluate: (state, bench) => headroomOutcome(state.speed, bench),
    },
    {
      name: 'stress',
      title: `${title}: device stress`,
      quantity: 'drain–source voltage',
      unit: 'V',
      sense: 'at most',
      asked: stackRunsHigh,
      evaluate: (state, bench) => stressOutcome(state.V_high, state.V_off ?? state.V_S, bench),
    },
  ]
}

/** Whether the stacked stages of a case run above what their devices stand. */
export function stackRunsHigh({ settings, node }: Case): boolean {
  const chosen = nominalStackSupply(settings, node)
  if ('missing' in chosen) return false
  const tolerance = settings.supply.tolerance ?? node.supply.tolerance
  const limit = continuousLimit({ settings, node }, PLAIN)
  return limit === null || chosen.V_nom * (1 + tolerance) > limit
}

/** V_DS = V_high − V_S: the device that is off, its drain at the supply. V_high [V], V_S [V] → [V]. */
export const offStress = formula(
  {
    symbol: 'V_DS',
    meaning: 'drain–source voltage of the device that is off',
    unit: 'V',
    source: 'derived: its drain rests at the supply, its source at the common node',
  },
  (V_high, V_S) => V_high - V_S,
)

/** The stress check of a stack that runs above the node's device limit. V_S is the common source node [V]. */
export function stressOutcome(V_high: number, V_S: number, bench: Bench): Outcome {
  const limit = continuousLimit(bench, bench.t)
  const stress = bench.t.calc(offStress, V_high, V_S)
  if (limit === null) {
    return { required: null, available: stress, margin: null, basis: 'not computed', reason: NO_LIMIT }
  }
  return {
    required: limit,
    available: stress,
    margin: bench.t.calc(marginAtMost, limit, stress),
    basis: 'device limit of the node',
  }
}
