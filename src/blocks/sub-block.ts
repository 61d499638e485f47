import type { Bench, Case } from './bench.ts'

/** One route to a demand on device speed. */
export interface RouteOutcome {
  readonly required: number | null
  readonly available: number | null
  readonly margin: number | null
  readonly reason?: string
}

/** What a check found at one operating point. `margin` is null only when the check is unknown. */
export interface Outcome {
  readonly required: number | null
  readonly available: number | null
  readonly margin: number | null
  /** What governed or bound, in words. */
  readonly basis: string
  readonly reason?: string
  readonly rule?: RouteOutcome
  readonly derived?: RouteOutcome
  /** Supply of the check [V], where it is not that of the stacked stages. */
  readonly supply?: number
  /** Further values whose derivation belongs into the steps. */
  readonly alsoShown?: readonly number[]
}

/** One comparison of required and available. */
export interface CheckSpec<State> {
  /** Short name, unique in the sub-block. */
  readonly name: string
  readonly title: string
  readonly quantity: string
  readonly unit: string
  readonly sense: 'at least' | 'at most'
  /** A yes or no: its margin is 1 + guard or 0 and ranks nothing. */
  readonly yesNo?: true
  /** Absent: always asked. */
  readonly asked?: (given: Case) => boolean
  /** What the scenario would have to state; with it, a check that was not asked is listed as not examined. */
  readonly because?: string
  readonly evaluate: (state: State, bench: Bench) => Outcome
}

export interface NamedResult {
  readonly name: string
  readonly value: number | null
  readonly unit: string
  readonly reason?: string
}

/** Whether a scenario asks for a sub-block; if not, why. */
export type Asked = { readonly yes: true } | { readonly yes: false; readonly because: string }
/** The scenario asks for it. */
export const ASKED: Asked = { yes: true }
/** The scenario does not ask for it, and why. */
export const notAsked = (because: string): Asked => ({ yes: false, because })

/** A state that could not be prepared: every check of the sub-block is unknown for this reason. */
export interface Unprepared {
  readonly unknown: string
}

/** A part of the block with its own demand on the device. */
export interface SubBlock<State> {
  readonly id: string
  readonly title: string
  /** Blocks that have this part. */
  readonly of: readonly ('link' | 'clock')[]
  /** Whether the option asks for it, apart from `examine`, which is applied to all alike. */
  readonly asked: (given: Case) => Asked
  /** Everything its checks share; run once an operating point. */
  readonly prepare: (bench: Bench) => State | Unprepared
  readonly checks: readonly CheckSpec<State>[]
  /** Named results, at the operating point that decides the first check, or that `worseBy` tells. */
  readonly results: (state: State, bench: Bench) => readonly NamedResult[]
  /** The larger, the worse is the operating point: results are shown where it is largest. */
  readonly worseBy?: (state: State, bench: Bench) => number
}

/** Closes a sub-block over its state, so that different ones can stand in one registry. */
export interface AnySubBlock {
  readonly id: string
  readonly title: string
  readonly of: readonly ('link' | 'clock')[]
  readonly asked: (given: Case) => Asked
  readonly checks: readonly Omit<CheckSpec<never>, 'evaluate'>[]
  /** Outcomes of the asked checks, in their order. */
  readonly outcomes: (bench: Bench, asked: readonly number[]) => readonly Outcome[]
  readonly results: (bench: Bench) => readonly NamedResult[]
  /** How bad this operating point is; null when the first check decides where results are shown. */
  readonly worseBy: ((bench: Bench) => number) | null
}

const unknownOutcome = (reason: string): Outcome => ({
  required: null,
  available: null,
  margin: null,
  basis: 'not computed',
  reason,
})

/** Makes a sub-block ready for the registry. */
export function subBlock<State extends object>(spec: SubBlock<State>): AnySubBlock {
  const { worseBy } = spec
  return {
    ...spec,
    outcomes: (bench, asked) => {
      const state = bench.once(spec.prepare)
      if ('unknown' in state) return asked.map(() => unknownOutcome(state.unknown))
      return asked.map((k) => spec.checks[k]!.evaluate(state, bench))
    },
    results: (bench) => {
      const state = bench.once(spec.prepare)
      return 'unknown' in state ? [] : spec.results(state, bench)
    },
    worseBy:
      worseBy === undefined
        ? null
        : (bench) => {
            const state = bench.once(spec.prepare)
            return 'unknown' in state ? Number.NEGATIVE_INFINITY : worseBy(state, bench)
          },
  }
}
