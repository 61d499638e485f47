import type { AnySubBlock } from '../blocks/sub-block.ts'
import { anyReceiver } from './bounds/any-receiver.ts'
import { codeword } from './codeword.ts'

/** What a lane as a whole is judged on, after its sub-blocks and its clock. */
export const LINK: readonly AnySubBlock[] = [anyReceiver, codeword]
