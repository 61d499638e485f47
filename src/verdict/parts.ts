import { SUB_BLOCKS } from '../blocks/registry.ts'
import type { AnySubBlock } from '../blocks/sub-block.ts'
import { CLOCKING } from '../clocking/registry.ts'
import { LINK } from '../link/registry.ts'

/** Everything that a case can be asked about, in the order in which it is shown. */
export const PARTS: readonly AnySubBlock[] = [...SUB_BLOCKS, ...CLOCKING, ...LINK]
