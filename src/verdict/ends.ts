import type { Case } from '../blocks/bench.ts'
import { watched } from '../blocks/watch.ts'
import { type Provenance, withNumber } from '../scenario/checked.ts'
import type { AskedBlock, Asking } from './asked.ts'
import { type Heard, type Worst, worstOf } from './margins.ts'
import { casePoints } from './points.ts'

/** An end of an uncertain input at which a check fails. */
export interface FailingEnd {
  readonly path: string
  readonly end: 'low' | 'high'
  readonly margin: number
}

/** Every asked check at its worst, and the ends of uncertain inputs at which it fails. */
export interface Judged {
  readonly worst: readonly Worst[]
  readonly ends: readonly (readonly FailingEnd[])[]
}

/**
 * Judges every asked check at its worst operating point with all inputs typical, then at the ends of the scenario's
 * uncertain inputs, one input at a time. Spreads of node values are left to the odds: stacking them here would
 * double the corners. A sub-block that never read an input is not judged again at its ends.
 */
export function judged(given: Case, asking: Asking, provenance: readonly Provenance[]): Judged {
  const spread = provenance.filter((one) => one.spread !== undefined)
  if (spread.length === 0) {
    return { worst: worstOf(given, asking, casePoints(given.settings, given.node)), ends: [] }
  }
  const { settings, watch } = watched(
    given.settings,
    spread.map(({ path }) => path),
  )
  const heard: Heard = { watch, read: asking.blocks.map(() => new Set<string>()) }
  const { value: points, read } = watch.during(() => casePoints(settings, given.node))
  for (const own of heard.read) for (const path of read) own.add(path)
  const worst = worstOf({ ...given, settings }, asking, points, heard)
  return { worst, ends: failingEnds(given, asking, spread, heard) }
}

function failingEnds(
  given: Case,
  asking: Asking,
  spread: readonly Provenance[],
  { read }: Heard,
): readonly (readonly FailingEnd[])[] {
  const starts = firstChecks(asking.blocks)
  const found: FailingEnd[][] = []
  for (const { path, spread: ends } of spread) {
    const readers = asking.blocks.flatMap((block, k) =>
      read[k]!.has(path) ? [{ block, start: starts[k]! }] : [],
    )
    if (readers.length === 0) continue
    const places = readers.flatMap(({ block, start }) => block.checks.map((_, k) => start + k))
    for (const end of ['low', 'high'] as const) {
      const settings = withNumber(given.settings, path, ends![end])
      const only = { ...asking, blocks: readers.map(({ block }) => block) }
      const margins = worstOf({ ...given, settings }, only, casePoints(settings, given.node))
      margins.forEach(({ outcome: { margin } }, k) => {
        const place = places[k]!
        found[place] ??= []
        if (margin !== null && margin < 1) found[place].push({ path, end, margin })
      })
    }
  }
  return found
}

/** Place of each sub-block's first check among all asked checks. */
function firstChecks(blocks: readonly AskedBlock[]): readonly number[] {
  let next = 0
  return blocks.map(({ checks }) => {
    const own = next
    next += checks.length
    return own
  })
}
