import type { AnySubBlock } from '../blocks/sub-block.ts'
import { clockPower } from './clock-power.ts'
import { jitterBudget } from './jitter-budget.ts'
import { phaseLockedLoop } from './phase-locked-loop.ts'

/** What the clock as a whole is judged on, after its sub-blocks. */
export const CLOCKING: readonly AnySubBlock[] = [phaseLockedLoop, jitterBudget, clockPower]
