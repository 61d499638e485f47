import type { Fault, Place } from './fault.ts'
import { faultAt } from './fault.ts'

/** A rule of thumb that the user gave as a formula: its text, and a function over the documented symbols. */
export interface UserRule {
  readonly text: string
  readonly run: (inputs: Readonly<Record<string, number>>) => number
}

/** Symbols a rule formula may use, all in SI. */
export const RULE_SYMBOLS = ['f_op', 'f_B', 'f_N', 'f_ck', 'f_osc', 'beta', 'k'] as const
/** Functions a rule formula may use. */
export const RULE_FUNCTIONS = ['sqrt', 'min', 'max', 'log', 'log10', 'exp', 'abs'] as const

/** Most characters of a formula. */
export const LONGEST_RULE = 200
const DEEPEST = 24
const ALLOWED = `numbers, + - * / ^, parentheses, ${RULE_SYMBOLS.join(' ')}, and ${RULE_FUNCTIONS.join(' ')}`

/** Two ordinary lanes: a rule that gives no positive number in either is none. */
const TRIED = [
  { f_op: 14e9, f_B: 28e9, f_N: 14e9, f_ck: 7e9, f_osc: 14e9, beta: 1.57, k: 3 },
  { f_op: 6e9, f_B: 5e9, f_N: 2.5e9, f_ck: 5e9, f_osc: 6e9, beta: 1, k: 8 },
]

type Evaluated = (inputs: Readonly<Record<string, number>>) => number

const CALLS: Readonly<Record<(typeof RULE_FUNCTIONS)[number], (...x: number[]) => number>> = {
  sqrt: Math.sqrt,
  min: Math.min,
  max: Math.max,
  log: Math.log,
  log10: Math.log10,
  exp: Math.exp,
  abs: Math.abs,
}

const OPERATORS: Readonly<Record<string, (a: number, b: number) => number>> = {
  '+': (a, b) => a + b,
  '-': (a, b) => a - b,
  '*': (a, b) => a * b,
  '/': (a, b) => a / b,
  '^': (a, b) => a ** b,
}

/** The parts of a mathjs syntax tree that are looked at. */
interface SyntaxNode {
  readonly type: string
  readonly value?: unknown
  readonly name?: string
  readonly op?: string
  readonly implicit?: boolean
  readonly content?: SyntaxNode
  readonly args?: readonly SyntaxNode[]
  readonly fn?: SyntaxNode
}

/** Turns a formula text into a syntax tree; throws a message on a syntax error. */
export type FormulaParser = (text: string) => SyntaxNode

/** Loads the parser of mathjs: its single-file bundle loads several times faster than its module tree. */
export async function loadFormulaParser(): Promise<FormulaParser> {
  const loaded = (await import('mathjs/lib/browser/math.js' as string)) as {
    default: { parse: FormulaParser }
  }
  return (text) => loaded.default.parse(text)
}

class NotArithmetic extends Error {}

/**
 * Reads a rule formula. The syntax tree is walked into plain functions here, so nothing a user writes ever
 * reaches an evaluator that could do more than arithmetic.
 *
 * @param text formula in mathjs notation over {@link RULE_SYMBOLS}, SI
 * @param place where it stands
 * @returns the compiled rule, or the fault
 */
export function readRule(
  text: string,
  place: Place,
  parse: FormulaParser,
): { readonly ok: true; readonly rule: UserRule } | { readonly ok: false; readonly fault: Fault } {
  const refuse = (found: string): { readonly ok: false; readonly fault: Fault } => ({
    ok: false,
    fault: faultAt(
      place,
      'rule.form',
      found,
      ALLOWED,
      'write plain arithmetic, for instance `3 * f_op / beta`',
    ),
  })
  if (text.length > LONGEST_RULE) return refuse(`${text.length} characters, more than ${LONGEST_RULE}`)
  if (/[;\n\r{}[\]"'=:?<>&|!%~@#$\\]/.test(text)) return refuse(text)
  try {
    const run = compiled(parse(text), 0)
    const sensible = TRIED.some((inputs) => Number.isFinite(run(inputs)) && run(inputs) > 0)
    return sensible ? { ok: true, rule: { text, run } } : refuse(`${text}, which gives no positive number`)
  } catch (error) {
    return refuse(error instanceof NotArithmetic ? error.message : `${text}, which cannot be read`)
  }
}

function compiled(node: SyntaxNode, depth: number): Evaluated {
  if (depth > DEEPEST) throw new NotArithmetic('a formula nested too deeply')
  const inner = (one: SyntaxNode): Evaluated => compiled(one, depth + 1)
  switch (node.type) {
    case 'ConstantNode':
      return constant(node)
    case 'SymbolNode':
      return symbol(node.name ?? '')
    case 'ParenthesisNode':
      return inner(node.content!)
    case 'OperatorNode':
      return operator(node, (node.args ?? []).map(inner))
    case 'FunctionNode':
      return call(node, (node.args ?? []).map(inner))
    default:
      throw new NotArithmetic(`${node.type.replace(/Node$/, '').toLowerCase()} in a formula`)
  }
}

function constant({ value }: SyntaxNode): Evaluated {
  if (typeof value !== 'number' || !Number.isFinite(value))
    throw new NotArithmetic(`the constant ${String(value)}`)
  return () => value
}

function symbol(name: string): Evaluated {
  if (!(RULE_SYMBOLS as readonly string[]).includes(name)) throw new NotArithmetic(`the symbol ${name}`)
  return (inputs) => inputs[name] ?? Number.NaN
}

function operator({ op = '', implicit }: SyntaxNode, args: readonly Evaluated[]): Evaluated {
  const [a, b] = args
  if (implicit === true) throw new NotArithmetic('a product without its sign')
  if (args.length === 1 && a !== undefined && (op === '-' || op === '+')) {
    return op === '-' ? (inputs) => -a(inputs) : a
  }
  const run = Object.hasOwn(OPERATORS, op) ? OPERATORS[op] : undefined
  if (run === undefined || a === undefined || b === undefined || args.length !== 2)
    throw new NotArithmetic(`the operator ${op}`)
  return (inputs) => run(a(inputs), b(inputs))
}

function call({ fn }: SyntaxNode, args: readonly Evaluated[]): Evaluated {
  const name = fn?.type === 'SymbolNode' ? (fn.name ?? '') : 'of a computed name'
  if (!Object.hasOwn(CALLS, name)) throw new NotArithmetic(`the function ${name}`)
  const run = CALLS[name as keyof typeof CALLS]
  const variadic = name === 'min' || name === 'max'
  if (args.length === 0 || (!variadic && args.length !== 1))
    throw new NotArithmetic(`${name} with ${args.length} arguments`)
  return (inputs) => run(...args.map((one) => one(inputs)))
}
