import { benchAt, type Case } from '../blocks/bench.ts'
import type { Outcome } from '../blocks/sub-block.ts'
import { PLAIN } from '../derivation/trace.ts'
import type { OperatingPoint } from '../device/conditions.ts'
import type { Asking } from './asked.ts'
import type { CasePoints } from './points.ts'

/** Every asked check of a case at one operating point: numbers only, nothing written down. The hot path. */
export function outcomesAt(given: Case, asking: Asking, at: OperatingPoint): readonly Outcome[] {
  const bench = benchAt(given, at, PLAIN)
  const outcomes: Outcome[] = []
  for (const { block, checks } of asking.blocks) {
    for (const outcome of block.outcomes(bench, checks)) outcomes.push(outcome)
  }
  return outcomes
}

/** A check of a case at its own worst operating point. */
export interface Worst {
  readonly at: OperatingPoint
  readonly outcome: Outcome
}

/** For each asked check, its worst operating point; unknown anywhere is unknown, and that point is taken. */
export function worstOf(given: Case, asking: Asking, points: CasePoints): readonly Worst[] {
  const worst: Worst[] = []
  for (const at of points.judged) {
    outcomesAt(given, asking, at).forEach((outcome, k) => {
      const known = worst[k]
      if (known === undefined || worse(outcome, known.outcome)) worst[k] = { at, outcome }
    })
  }
  return worst
}

function worse(outcome: Outcome, than: Outcome): boolean {
  if (than.margin === null) return false
  return outcome.margin === null || outcome.margin < than.margin
}

/** The smallest margin of a case over its checks and operating points; null when any asked check is unknown. */
export function caseMargin(given: Case, asking: Asking, points: CasePoints): number | null {
  let least = Number.POSITIVE_INFINITY
  for (const at of points.judged) {
    for (const { margin } of outcomesAt(given, asking, at)) {
      if (margin === null) return null
      if (margin < least) least = margin
    }
  }
  return least === Number.POSITIVE_INFINITY ? null : least
}
