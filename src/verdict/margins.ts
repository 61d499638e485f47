import { benchAt, type Case } from '../blocks/bench.ts'
import type { Outcome } from '../blocks/sub-block.ts'
import type { Watch } from '../blocks/watch.ts'
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

/** As above, and adds to each sub-block's set which of the watched inputs it read. */
function outcomesHeard(given: Case, asking: Asking, at: OperatingPoint, heard: Heard): readonly Outcome[] {
  const { watch, read } = heard
  const { value: bench, read: byAll } = watch.during(() => benchAt({ ...given, watch }, at, PLAIN))
  return asking.blocks.flatMap(({ block, checks }, k) => {
    const { value, read: own } = watch.during(() => block.outcomes(bench, checks))
    for (const path of [...byAll, ...own]) read[k]!.add(path)
    return value
  })
}

/** What is read while a case is judged: a watch on its inputs, and for each asked sub-block what it read. */
export interface Heard {
  readonly watch: Watch
  readonly read: readonly Set<string>[]
}

/** A check of a case at its own worst operating point. */
export interface Worst {
  readonly at: OperatingPoint
  readonly outcome: Outcome
}

/** For each asked check, its worst operating point; unknown anywhere is unknown, and that point is taken. */
export function worstOf(
  given: Case,
  asking: Asking,
  points: CasePoints,
  heard: Heard | null = null,
): readonly Worst[] {
  const worst: Worst[] = []
  for (const at of points.judged) {
    const outcomes = heard === null ? outcomesAt(given, asking, at) : outcomesHeard(given, asking, at, heard)
    outcomes.forEach((outcome, k) => {
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
