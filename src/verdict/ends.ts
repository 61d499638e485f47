import type { Case } from '../blocks/bench.ts'
import { type Provenance, withNumber } from '../scenario/checked.ts'
import type { Asking } from './asked.ts'
import { worstOf } from './margins.ts'
import { casePoints } from './points.ts'

/** An end of an uncertain input at which a check fails. */
export interface FailingEnd {
  readonly path: string
  readonly end: 'low' | 'high'
  readonly margin: number
}

/**
 * For each asked check, the ends of the scenario's uncertain inputs at which it fails, one input at a time, all
 * others typical. Spreads of node values are left to the odds: stacking them here would double the corners.
 */
export function failingEnds(
  given: Case,
  asking: Asking,
  provenance: readonly Provenance[],
): readonly (readonly FailingEnd[])[] {
  const found: FailingEnd[][] = []
  for (const { path, spread } of provenance) {
    if (spread === undefined) continue
    for (const end of ['low', 'high'] as const) {
      const settings = withNumber(given.settings, path, spread[end])
      const margins = worstOf({ ...given, settings }, asking, casePoints(settings, given.node))
      margins.forEach(({ outcome: { margin } }, k) => {
        found[k] ??= []
        if (margin !== null && margin < 1) found[k].push({ path, end, margin })
      })
    }
  }
  return found
}
