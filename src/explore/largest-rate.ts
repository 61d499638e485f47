import type { Case } from '../blocks/bench.ts'
import { bracketedRoot } from '../numeric/root.ts'
import type { Settings } from '../scenario/keys/index.ts'
import { type Asking, askedOf } from '../verdict/asked.ts'
import { caseMargin, worstOf } from '../verdict/margins.ts'
import { casePoints } from '../verdict/points.ts'

/** A stretch of data rates [bit/s] on which the case keeps the wanted margin. */
export interface PassingStretch {
  readonly from: number
  readonly to: number
}

/** How far a case reaches in data rate. */
export type Reach =
  | {
      readonly kind: 'found'
      /** Largest rate [bit/s] with the wanted margin. */
      readonly rate: number
      /** Id of the check that stops it just above. */
      readonly stoppedBy: string
      /** Every stretch that passes, ascending: more than one when the margin is not monotonic. */
      readonly stretches: readonly PassingStretch[]
    }
  | { readonly kind: 'beyond'; readonly rate: number; readonly stretches: readonly PassingStretch[] }
  | { readonly kind: 'nowhere'; readonly stoppedBy: string }
  | { readonly kind: 'unknown'; readonly reason: string }

/** Where and how finely to look. */
export interface Search {
  /** Least and largest rate looked at [bit/s]. */
  readonly from: number
  readonly to: number
  /** Margin to keep: 1 is break-even, 1 + guard a clear pass. */
  readonly margin: number
  /** Points a decade of the first scan; an island narrower than one step can be missed. */
  readonly pointsPerDecade?: number
}

const TOLERANCE = 1e-9

/** The settings of an option at another data rate; the oscillator's range follows in proportion. */
export function settingsAtRate(settings: Settings, rate: number): Settings {
  const { data_rate, oscillator } = settings
  if (data_rate === null) return settings
  const ratio = rate / data_rate
  if (oscillator === null) return { ...settings, data_rate: rate }
  const [low, high] = oscillator.range
  return { ...settings, data_rate: rate, oscillator: { ...oscillator, range: [low * ratio, high * ratio] } }
}

/**
 * The largest data rate at which a case still has a wanted margin. The whole interval is scanned first, so that
 * a margin that is not monotonic shows as several stretches instead of a wrong root; each end is then refined.
 *
 * @param given a link case
 * @param search interval [bit/s], margin [1] and resolution
 * @returns the rate [bit/s] to 1e-9 and the check that stops it; `beyond` when even the top of the interval
 * passes, `nowhere` when nothing does, `unknown` when an asked check cannot be computed or the block has no rate
 */
export function largestRate(given: Case, search: Search): Reach {
  if (given.settings.data_rate === null) return { kind: 'unknown', reason: 'the block has no data rate' }
  const asking = askedOf(given)
  const spare = (x: number): number | null => spareAt(given, asking, Math.exp(x), search.margin)
  const grid = gridOf(search)
  const values = grid.map(spare)
  if (values.some((value) => value === null)) {
    return { kind: 'unknown', reason: 'an asked check cannot be computed at every rate' }
  }
  const stretches = stretchesOf(grid, values as readonly number[], (x) => spare(x) ?? Number.NaN)
  const last = stretches.at(-1)
  if (last === undefined) return { kind: 'nowhere', stoppedBy: limiting(given, asking, search.from) }
  if (last.to >= search.to * (1 - TOLERANCE)) return { kind: 'beyond', rate: search.to, stretches }
  return { kind: 'found', rate: last.to, stoppedBy: limiting(given, asking, last.to * (1 + 1e-6)), stretches }
}

function gridOf({ from, to, pointsPerDecade = 24 }: Search): readonly number[] {
  const steps = Math.max(2, Math.ceil(Math.log10(to / from) * pointsPerDecade))
  const [a, b] = [Math.log(from), Math.log(to)]
  return Array.from({ length: steps + 1 }, (_, k) => a + ((b - a) * k) / steps)
}

function spareAt(given: Case, asking: Asking, rate: number, margin: number): number | null {
  const settings = settingsAtRate(given.settings, rate)
  const found = caseMargin({ ...given, settings }, asking, casePoints(settings, given.node))
  return found === null ? null : found - margin
}

function stretchesOf(
  grid: readonly number[],
  values: readonly number[],
  spare: (x: number) => number,
): readonly PassingStretch[] {
  const stretches: PassingStretch[] = []
  let from: number | null = values[0]! >= 0 ? grid[0]! : null
  for (let k = 1; k < grid.length; k++) {
    const passes = values[k]! >= 0
    if (passes === values[k - 1]! >= 0) continue
    const edge = bracketedRoot(spare, grid[k - 1]!, grid[k]!, TOLERANCE / 30)
    if (passes) from = edge
    else {
      stretches.push({ from: Math.exp(from!), to: Math.exp(edge) })
      from = null
    }
  }
  if (from !== null) stretches.push({ from: Math.exp(from), to: Math.exp(grid.at(-1)!) })
  return stretches
}

/** Id of the check with the smallest margin at a rate. */
function limiting(given: Case, asking: Asking, rate: number): string {
  const settings = settingsAtRate(given.settings, rate)
  const worst = worstOf({ ...given, settings }, asking, casePoints(settings, given.node))
  const ids = asking.blocks.flatMap(({ block, checks }) =>
    checks.map((k) => `${block.id}.${block.checks[k]!.name}`),
  )
  let least = 0
  worst.forEach(({ outcome }, k) => {
    if (
      (outcome.margin ?? Number.POSITIVE_INFINITY) <
      (worst[least]!.outcome.margin ?? Number.POSITIVE_INFINITY)
    )
      least = k
  })
  return ids[least] ?? 'no check'
}
