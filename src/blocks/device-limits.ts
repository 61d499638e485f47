import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { type Case, nominalStackSupply } from './bench.ts'

/** What the transistors of the stacked stages stand, core or thick-oxide. */

const THICK = 'estimate: what the node does not state for its thick-oxide device'

/** V_limit = 1.1 V_io. V_io [V] → [V]. */
export const thickLimit = formula(
  { symbol: 'V_limit', meaning: 'continuous limit of the thick-oxide device', unit: 'V', source: THICK },
  (V_io) => 1.1 * V_io,
)

/** V_peak = 1.6 V_io. V_io [V] → [V]. */
export const thickPeak = formula(
  { symbol: 'V_peak', meaning: 'momentary limit of the thick-oxide device', unit: 'V', source: THICK },
  (V_io) => 1.6 * V_io,
)

/** Whether the stacked stages of a case are made of core transistors. */
export function coreStack(given: Pick<Case, 'settings' | 'node'>): boolean {
  const chosen = nominalStackSupply(given.settings, given.node)
  return 'missing' in chosen || chosen.device === given.node.nmos
}

/** Largest continuous voltage [V] across a transistor of the stacked stages; null when the node states none. */
export function continuousLimit(given: Pick<Case, 'settings' | 'node'>, t: Trace): number | null {
  const { supply } = given.node
  if (coreStack(given)) return supply.device_limit
  return supply.thick_limit ?? (supply.io === null ? null : t.calc(thickLimit, supply.io))
}

/** Largest momentary voltage [V] of an oscillating node of the stacked stages; null when the node states none. */
export function momentaryLimit(given: Pick<Case, 'settings' | 'node'>, t: Trace): number | null {
  const { supply } = given.node
  if (coreStack(given)) return supply.peak_limit
  return supply.thick_peak ?? (supply.io === null ? null : t.calc(thickPeak, supply.io))
}

export const NO_LIMIT = 'the node states no limit for its thick-oxide device and no io supply'
