import type { HighSide, LoopProblem, LowSide } from '../../src/clocking/loop/problem.ts'

const LOW: LowSide = { flat: 0, flicker: 0, modulator: 0, order: 3, table: null, scale: 0 }
const HIGH: HighSide = { flat: 0, flicker: 0, white: 0, flicker3: 0, table: null, scale: 0 }

/** A loop and its sources as plain numbers; nothing makes noise unless it is given. */
export function problem(
  given: Partial<Omit<LoopProblem, 'low' | 'high'>> & {
    readonly low?: Partial<LowSide>
    readonly high?: Partial<HighSide>
  },
): LoopProblem {
  return {
    kind: 'type-II',
    f_ref: 100e6,
    r: 2 + Math.sqrt(3),
    delayed: false,
    f_1: 1e3,
    f_2: 1e9,
    f_CDR: null,
    filter: 0,
    ...given,
    low: { ...LOW, ...given.low },
    high: { ...HIGH, ...given.high },
  }
}
