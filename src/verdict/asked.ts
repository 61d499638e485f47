import type { Case } from '../blocks/bench.ts'
import type { AnySubBlock, CheckSpec } from '../blocks/sub-block.ts'
import { PARTS } from './parts.ts'
import type { NotExamined } from './result.ts'

/** A sub-block that a case asks for, with the places of its asked checks. */
export interface AskedBlock {
  readonly block: AnySubBlock
  readonly checks: readonly number[]
}

/** What a case asks, and what it does not, with the reason. */
export interface Asking {
  readonly blocks: readonly AskedBlock[]
  readonly notExamined: readonly NotExamined[]
}

/** Which sub-blocks and checks a case asks for. */
export function askedOf(given: Case): Asking {
  const blocks: AskedBlock[] = []
  const notExamined: NotExamined[] = []
  for (const block of PARTS) {
    if (!block.of.includes(given.block)) continue
    const asked = block.asked(given)
    const { examine } = given.settings
    if (examine !== null && !examine.includes(block.id)) {
      notExamined.push({ subBlock: block.id, title: block.title, reason: 'left out by `examine`' })
    } else if (!asked.yes) {
      notExamined.push({ subBlock: block.id, title: block.title, reason: asked.because })
    } else {
      const checks = askedChecks(block.checks, given)
      blocks.push({ block, checks })
      for (const [k, { title, because }] of block.checks.entries()) {
        if (because !== undefined && !checks.includes(k)) {
          notExamined.push({ subBlock: block.id, title, reason: because })
        }
      }
    }
  }
  return { blocks, notExamined }
}

function askedChecks(checks: readonly Pick<CheckSpec<never>, 'asked'>[], given: Case): readonly number[] {
  return checks.flatMap((check, k) => (check.asked === undefined || check.asked(given) ? [k] : []))
}

/** Checks that a case asks for in all, the length of one evaluated point. */
export const askedCount = (asking: Asking): number =>
  asking.blocks.reduce((sum, { checks }) => sum + checks.length, 0)
