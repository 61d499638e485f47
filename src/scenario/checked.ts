import type { Fault } from './fault.ts'
import type { ScenarioHead, Settings } from './keys/index.ts'
import type { UserRule } from './rule-formula.ts'

/** Split normal: 5th, 50th and 95th percentile, in SI. */
export interface Spread {
  readonly low: number
  readonly typical: number
  readonly high: number
}

/** One value of the checked file, with where it came from. */
export interface Provenance {
  /** Dotted path of the key, such as `oscillator.bank_q`. */
  readonly path: string
  readonly symbol: string
  readonly meaning: string
  readonly value:
    | number
    | string
    | readonly number[]
    | readonly string[]
    | readonly (readonly number[])[]
    | null
  readonly unit: string
  readonly shown?: string
  readonly source: string
  /** `published`, `derived`, `common practice`, `estimate`, `invented`, `given`. */
  readonly evidence: string
  readonly origin: 'scenario' | 'node' | 'default'
  /** Ids of the sub-blocks or topics whose checks use the value; absent when any may. */
  readonly usedBy?: readonly string[]
  /** Present when the file stated a spread. */
  readonly spread?: Spread
}

/** One alternative: its settings at the typical value of every uncertain input, and the provenance of each. */
export interface OptionInput {
  readonly id: string
  readonly label: string
  readonly settings: Settings
  readonly provenance: readonly Provenance[]
  /** Rules of thumb given as formulas, compiled, by sub-block. */
  readonly rules: Readonly<Partial<Record<string, UserRule>>>
}

/** A checked scenario: everything in SI, every fault already reported. */
export interface Scenario {
  readonly head: ScenarioHead
  readonly options: readonly OptionInput[]
  /** Every file read, in reading order, for the hash in the memo. */
  readonly files: readonly { readonly file: string; readonly text: string }[]
}

/** A checked value, or every fault that was found on the way to it. */
export type Outcome<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly faults: readonly Fault[] }

/** A copy of the settings with the number at one dotted path replaced: for ends of spreads, draws and sweeps. */
export function withNumber(settings: Settings, path: string, value: number): Settings {
  const [head, ...rest] = path.split('.')
  const key = head as keyof Settings
  const inner = settings[key]
  const replaced = rest.length === 0 ? value : withNumber(inner as unknown as Settings, rest.join('.'), value)
  return { ...settings, [key]: replaced }
}
