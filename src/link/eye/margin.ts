import { formula } from '../../derivation/formula.ts'
import { type Decision, disturbanceAt, signalOf } from './sampled.ts'
import { quantileOf, tailsOf } from './tail.ts'

const ANNEX = 'IEEE 802.3bj-2014, 93A.1'

/** COM = 20 log10(A_s/A_ni). A_s [V], A_ni [V] → [dB]. */
export const operatingMargin = formula(
  { symbol: 'COM', meaning: 'channel operating margin', unit: 'dB', source: ANNEX },
  (A_s, A_ni) => 20 * Math.log10(A_s / A_ni),
)

/** V_eye = 2 (A_s − A_ni): inner opening of each eye at the target; negative when closed. A_s [V], A_ni [V] → [V]. */
export const eyeHeight = formula(
  { symbol: 'V_eye', meaning: 'eye height at the error target', unit: 'V', source: ANNEX },
  (A_s, A_ni) => 2 * (A_s - A_ni),
)

/** Signal and disturbance of a decision [V]. */
export interface Opening {
  readonly A_s: number
  /** Amplitude that the disturbance exceeds, to one side, with the target error ratio. */
  readonly A_ni: number
}

/**
 * Signal against the disturbance at a detector error ratio, one-sided as the annex has it.
 *
 * @param decision the pulse and what is beside it
 * @param target detector error ratio, 0 < … < 0.5 [1]
 */
export function openingOf(decision: Decision, target: number): Opening {
  const tails = tailsOf(disturbanceAt(decision, 0))
  return { A_s: signalOf(decision), A_ni: tails === null ? 0 : quantileOf(tails, target) }
}
