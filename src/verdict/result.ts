import type { ClockingShown } from '../clocking/shown.ts'
import type { Step } from '../derivation/recorder.ts'

/** The result contract: what `check --json` prints and what stands beside every memo. Values are in SI. */

export type Verdict = 'pass' | 'tight' | 'fail' | 'unknown'

/** Version of this contract. */
export const RESULT_FORMAT = 1

export interface OperatingPointShown {
  readonly corner: 'slow' | 'typical' | 'fast'
  readonly temperature_K: number
  readonly supply_V: number
}

/** One route to a demand on device speed. */
export interface Route {
  readonly required: number | null
  readonly available: number | null
  readonly margin: number | null
  readonly reason?: string
}

export interface CheckResult {
  /** `<subBlock>.<short name>`, unique within a case. */
  readonly id: string
  readonly subBlock: string
  readonly title: string
  /** What is compared, for instance `device transit frequency`. */
  readonly quantity: string
  readonly required: number | null
  readonly available: number | null
  readonly unit: string
  readonly sense: 'at least' | 'at most'
  readonly margin: number | null
  readonly typicalMargin: number | null
  readonly verdict: Verdict
  readonly operatingPoint: OperatingPointShown | null
  /** What governed: `rule`, `derived`, `law`, `limit` … in words a reader understands. */
  readonly basis: string
  readonly rule?: Route
  readonly derived?: Route
  /** Why a value is missing, which end of an uncertain input fails, what disagrees. */
  readonly reason?: string
  /** Advisory checks are shown but do not move the case verdict. */
  readonly advisory?: boolean
  /** A yes or no: its margin is 1 + guard or 0. */
  readonly yesNo?: true
  readonly steps: readonly Step[]
}

export interface NamedValue {
  readonly value: number | null
  readonly unit: string
  readonly reason?: string
}

export interface NotExamined {
  readonly subBlock: string
  readonly title: string
  readonly reason: string
}

export interface CaseResult {
  readonly option: string
  readonly node: string
  readonly verdict: Verdict
  readonly margin: number | null
  /** Id of the limiting check, or null when none is known. */
  readonly limitedBy: string | null
  readonly notExamined: readonly NotExamined[]
  readonly checks: readonly CheckResult[]
  readonly results: Readonly<Record<string, NamedValue>>
  /** Curves and budget lines of the clock; null without a loop, or when only verdicts were wanted. */
  readonly clocking: ClockingShown | null
}

export type Origin = 'scenario' | 'node' | 'default'

/** One value that was used, where it came from and how far it is to be trusted. */
export interface Assumption {
  /** For instance `oscillator.bank_q`, `options.nrz-56.clocking`, `nodes.P28.nmos.mu0`. */
  readonly path: string
  readonly value:
    | number
    | string
    | readonly number[]
    | readonly string[]
    | readonly (readonly number[])[]
    | null
  /** Stated spread of an uncertain value, in the same unit. */
  readonly low?: number
  readonly high?: number
  readonly unit: string
  /** Unit for display. */
  readonly shown?: string
  readonly source: string
  /** `published`, `derived`, `common practice`, `estimate`, `invented`, `given`. */
  readonly evidence: string
  readonly origin: Origin
}

export interface OptionShown {
  readonly id: string
  readonly label: string
  readonly dataRate_bps: number | null
  readonly symbolRate_Bd: number | null
  readonly modulation: string | null
  readonly clocking: string | null
}

export interface NodeShown {
  readonly id: string
  readonly label: string
  readonly class_nm: number
}

export interface Answer {
  readonly sentence: string
  /** Case names `option in node`. */
  readonly passes: readonly string[]
  readonly tight: readonly string[]
  readonly fails: readonly string[]
  readonly unknown: readonly string[]
}

export interface Result {
  readonly format: number
  readonly tool: { readonly name: string; readonly version: string }
  readonly scenario: {
    readonly title: string
    readonly question: string | null
    readonly revision: string | null
    readonly date: string | null
    readonly authors: readonly string[]
    readonly notes: string | null
    readonly block: 'link' | 'clock'
  }
  readonly inputs: readonly { readonly file: string; readonly sha256: string }[]
  readonly guard: number
  readonly options: readonly OptionShown[]
  readonly nodes: readonly NodeShown[]
  readonly assumptions: readonly Assumption[]
  readonly cases: readonly CaseResult[]
  readonly answer: Answer
}
