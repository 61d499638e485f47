import type { Verdict } from '../../verdict/result.ts'
import type { Figure } from '../figure/figure.ts'
import type { Runs } from '../text/runs.ts'
import type { ClockingGroup } from './clocking.ts'

/** Everything a memo says, in order, as text with units: HTML, PDF and later readers only lay it out. */
export interface MemoModel {
  readonly title: string
  readonly question: string | null
  readonly notes: string | null
  readonly facts: readonly Fact[]
  readonly answer: readonly string[]
  readonly verdictKey: string
  readonly nodes: readonly { readonly id: string; readonly label: string }[]
  readonly grid: readonly GridRow[]
  readonly limits: readonly LimitRow[]
  readonly notExamined: readonly NotExaminedRow[]
  readonly unknown: readonly UnknownRow[]
  readonly speed: readonly Figure[]
  readonly margins: Figure
  readonly headroom: readonly HeadroomGroup[]
  readonly clocking: readonly ClockingGroup[]
  readonly clockingJitterColumns: readonly string[]
  readonly clockingPartsColumns: readonly string[]
  readonly cases: readonly CaseSection[]
  readonly assumptions: readonly AssumptionGroup[]
  readonly assumptionCount: string
  /** Values of the node files, key by key; one cell a node in the order of `nodes`. */
  readonly nodeKeys: readonly NodeKeyRow[]
  /** Derivations of the limiting checks, cases with the same steps together. */
  readonly derivations: readonly DerivationGroup[]
  readonly sources: readonly string[]
  readonly cautions: readonly string[]
  readonly signatures: readonly string[]
  readonly inputs: readonly { readonly file: string; readonly sha256: string }[]
}

export interface Fact {
  readonly label: string
  readonly text: string
}

export interface GridRow {
  readonly option: string
  readonly about: string
  readonly cells: readonly GridCell[]
}

export interface GridCell {
  readonly anchor: string
  readonly name: string
  readonly verdict: Verdict
  readonly margin: string
  /** Sub-block or title that limits, short. */
  readonly limit: string
}

export interface LimitRow {
  readonly anchor: string
  readonly option: string
  readonly node: string
  readonly verdict: Verdict
  readonly title: string
  readonly required: string
  readonly available: string
  readonly margin: string
  readonly at: string
  readonly next: string
  /** Why a case is not judged although a limiting check is known. */
  readonly note: string
}

export interface NotExaminedRow {
  readonly title: string
  readonly reason: string
  readonly cases: string
}

export interface UnknownRow {
  readonly title: string
  readonly reason: string
  readonly cases: string
}

export interface HeadroomRow {
  readonly node: string
  readonly subBlock: string
  readonly verdict: Verdict
  readonly available: string
  readonly needed: string
  readonly spare: string
  readonly binding: string
  /** Design point: f_T, IC, J, V_GS, V_DSsat, g_m/I_D, self-gain. */
  readonly design: readonly string[]
}

export interface HeadroomGroup {
  readonly option: string
  readonly rows: readonly HeadroomRow[]
}

export interface CheckRow {
  readonly anchor: string
  readonly id: string
  readonly subBlock: string
  readonly title: string
  readonly quantity: string
  readonly sense: string
  readonly required: string
  readonly available: string
  readonly margin: string
  readonly typical: string
  readonly verdict: Verdict
  readonly advisory: boolean
  readonly at: string
  readonly basis: string
  readonly routes: readonly string[]
  readonly reason: string
  readonly steps: readonly StepShown[]
  /** The steps that no earlier check of the same case shows. */
  readonly ownSteps: readonly StepShown[]
  /** The steps that earlier checks of the same case show, with their values. */
  readonly sharedSteps: readonly SharedSteps[]
}

/** Steps of a derivation that stand under another check. */
export interface SharedSteps {
  readonly anchor: string
  readonly title: string
  readonly steps: readonly StepShown[]
}

/** One derivation that several cases share step by step, only with other numbers. */
export interface DerivationGroup {
  readonly title: string
  readonly cases: readonly {
    readonly name: string
    readonly option: string
    readonly node: string
    readonly verdict: Verdict
    readonly margin: string
    readonly steps: readonly StepShown[]
  }[]
}

/** One key of the node files with its value in every node. */
export interface NodeKeyRow {
  readonly key: string
  readonly cells: readonly {
    readonly value: string
    readonly evidence: string
    readonly marks: string
    readonly source: number
  }[]
}

export interface StepShown {
  readonly kind: 'leaf' | 'formula' | 'search' | 'kernel'
  readonly symbol: Runs
  readonly meaning: string
  /** Formula with symbols, residual of a search, or method of a kernel. Empty for given values. */
  readonly formula: Runs
  /** Formula with numbers in place of symbols. Empty for given values. */
  readonly substituted: Runs
  readonly value: string
  /** Number in the list of sources, 1 for the first. */
  readonly source: number
  readonly tolerance: string
  readonly path: string
  readonly yields: string
}

export interface CaseSection {
  readonly anchor: string
  readonly name: string
  readonly option: string
  readonly node: string
  readonly verdict: Verdict
  readonly margin: string
  readonly checks: readonly CheckRow[]
}

export interface AssumptionRow {
  readonly path: string
  readonly value: string
  readonly spread: string
  readonly source: string
  readonly evidence: string
  readonly origin: string
  /** `default`, `estimate`, both or empty. */
  readonly marks: string
}

export interface AssumptionGroup {
  readonly title: string
  readonly rows: readonly AssumptionRow[]
}
