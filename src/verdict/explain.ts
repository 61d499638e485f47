import { type Bench, benchAt, type Case } from '../blocks/bench.ts'
import type { AnySubBlock } from '../blocks/sub-block.ts'
import { type KnownLeaves, Recorder, type Step } from '../derivation/recorder.ts'
import type { OperatingPoint } from '../device/conditions.ts'
import { knownLeaves } from './leaves.ts'

/** Writes down the steps of one check of a sub-block at an operating point. */
export type Explaining = (block: AnySubBlock, check: number, at: OperatingPoint) => readonly Step[]

/**
 * Runs checks again, this time writing down every step. Same functions, same bits. Checks of a sub-block at the
 * same operating point share what they rest on, so that it runs once.
 *
 * Errors: what is returned throws when a number cannot be traced to its origin, a fault of the program.
 *
 * @param given the case
 * @param leaves numbers that scenario and node give
 */
export function explaining(given: Case, leaves: KnownLeaves): Explaining {
  const begun = new Map<AnySubBlock, Map<OperatingPoint, Recorded>>()
  return (block, check, at) => {
    const ofBlock = begun.get(block) ?? new Map<OperatingPoint, Recorded>()
    begun.set(block, ofBlock)
    const { bench, recorder } = ofBlock.get(at) ?? recordedAt(given, at, leaves, block.id)
    ofBlock.set(at, { bench, recorder })
    const [outcome] = block.outcomes(bench, [check])
    if (outcome === undefined) return []
    return recorder.steps(outcome.required, outcome.available, outcome.margin, outcome.alsoShown)
  }
}

interface Recorded {
  readonly bench: Bench
  readonly recorder: Recorder
}

function recordedAt(given: Case, at: OperatingPoint, leaves: KnownLeaves, purpose: string): Recorded {
  const recorder = new Recorder(knownLeaves(leaves, at), purpose)
  return { bench: benchAt(given, at, recorder), recorder }
}
