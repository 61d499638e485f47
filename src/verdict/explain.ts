import { benchAt, type Case } from '../blocks/bench.ts'
import type { AnySubBlock } from '../blocks/sub-block.ts'
import { type KnownLeaves, Recorder, type Step } from '../derivation/recorder.ts'
import type { OperatingPoint } from '../device/conditions.ts'

/**
 * Runs one check again, this time writing down every step. Same functions, same bits.
 *
 * Errors: throws when a number cannot be traced to its origin, a fault of the program.
 */
export function stepsOf(
  given: Case,
  block: AnySubBlock,
  check: number,
  at: OperatingPoint,
  known: KnownLeaves,
): readonly Step[] {
  const recorder = new Recorder(known)
  const [outcome] = block.outcomes(benchAt(given, at, recorder), [check])
  if (outcome === undefined) return []
  return recorder.steps(outcome.required, outcome.available, outcome.margin, outcome.alsoShown)
}
