import type { About, Formula } from './formula.ts'

type UpToTen = (
  a?: number,
  b?: number,
  c?: number,
  d?: number,
  e?: number,
  f?: number,
  g?: number,
  h?: number,
  i?: number,
  j?: number,
) => number

/** A number that was given, not computed. `path` names its place in the scenario or node, where it has one. */
export interface Given extends About {
  readonly path?: string
}

/** A root that was searched for: the residual that vanishes there and how closely. */
export interface Searched extends About {
  /** The residual as a readable expression, for instance `f_T(J) - f_T_req`. */
  readonly residual: string
  readonly tolerance: string
}

/** An arithmetic expression that a user gave, in mathjs notation. */
export interface UserExpression extends About {
  readonly text: string
}

/** A named numeric procedure such as an integral or a scan, with its method and its error. */
export interface Procedure extends About {
  readonly method: string
  readonly error: string
}

/**
 * What calculators talk to while they compute. The plain trace only computes; a recording one also writes
 * down every step. Both return the same bits, because both run the same functions.
 */
export interface Trace {
  /** Runs a formula over its arguments, in the order of its parameters. */
  calc<A extends number[]>(formula: Formula<A>, ...args: A): number
  /** Notes a given value that is not among the node's or the scenario's own numbers. */
  leaf(about: Given, value: number): number
  /** Notes the root of a search; `inputs` are the numbers the residual depends on. */
  search(about: Searched, value: number, inputs?: Readonly<Record<string, number>>): number
  /** Notes the value of an expression that a user gave; `inputs` are all its symbols. */
  expression(about: UserExpression, value: number, inputs: Readonly<Record<string, number>>): number
  /** Notes the result of a numeric procedure; `inputs` are the numbers it was given. */
  kernel(about: Procedure, value: number, inputs?: Readonly<Record<string, number>>): number
  /** Keeps the derivation of a value that shows a search was solved, wherever the root `of` that search is used. */
  show(value: number, of: number): void
  /** Says that a parameter of coming formulas stands for a symbol of another name. */
  alias(parameter: string, symbol: string): void
  /** True when steps are being written down: lets callers build `inputs` only then. */
  readonly recording: boolean
}

/** Computes and remembers nothing. */
class PlainTrace implements Trace {
  readonly recording = false
  calc<A extends number[]>(formula: Formula<A>, ...args: A): number
  // A fixed arity keeps the hot path free of argument arrays.
  calc(
    formula: Formula<number[]>,
    a?: number,
    b?: number,
    c?: number,
    d?: number,
    e?: number,
    f?: number,
    g?: number,
    h?: number,
    i?: number,
    j?: number,
  ): number {
    return (formula.run as UpToTen)(a, b, c, d, e, f, g, h, i, j)
  }
  leaf(_about: Given, value: number): number {
    return value
  }
  search(_about: Searched, value: number): number {
    return value
  }
  expression(_about: UserExpression, value: number): number {
    return value
  }
  kernel(_about: Procedure, value: number): number {
    return value
  }
  show(): void {}
  alias(): void {}
}

/** The trace of the hot path. It holds no state, so one serves everybody. */
export const PLAIN: Trace = new PlainTrace()
