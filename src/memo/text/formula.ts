import { setNumber } from './number.ts'
import { base, joined, plain, type Run, type Runs, sup } from './runs.ts'
import { setSymbol } from './symbol.ts'

interface Token {
  readonly kind: 'name' | 'number' | 'mark'
  readonly text: string
}

/** Names and numbers of an expression in mathjs notation, everything else mark by mark. */
function tokens(expression: string): readonly Token[] {
  const pattern =
    /([A-Za-z_][A-Za-z0-9_]*)|((?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)|(>=|<=|===?|!==?|&&|\|\||\S)/g
  return [...expression.matchAll(pattern)].map(([text, name, number]) => ({
    kind: name !== undefined ? 'name' : number !== undefined ? 'number' : 'mark',
    text,
  }))
}

const FUNCTIONS: Readonly<Record<string, string>> = {
  sqrt: '√',
  log: 'ln',
  log10: 'lg',
  log2: 'log₂',
  PI: 'π',
}
const MARKS: Readonly<Record<string, string>> = {
  '*': '·',
  '/': ' / ',
  '+': ' + ',
  '-': ' − ',
  ',': ', ',
  '>=': ' ≥ ',
  '<=': ' ≤ ',
  '<': ' < ',
  '>': ' > ',
  '=': ' = ',
  '==': ' = ',
  '===': ' = ',
  '?': ' ? ',
  ':': ' : ',
}

/**
 * An expression as it is set: √, ·, raised powers, lowered indices, Greek letters.
 *
 * @param expression mathjs notation
 * @param inputs when given, each of these names is replaced by its number (SI)
 */
export function setFormula(expression: string, inputs?: Readonly<Record<string, number>>): Runs {
  return joined(setTokens(tokens(expression), inputs))
}

function setTokens(list: readonly Token[], inputs: Readonly<Record<string, number>> | undefined): Runs {
  const out: Run[] = []
  for (let k = 0; k < list.length; k++) {
    const token = list[k]!
    if (token.text === '^') {
      const end = exponentEnd(list, k + 1)
      out.push(...raised(list.slice(k + 1, end), inputs))
      k = end - 1
    } else out.push(...setToken(list, k, inputs))
  }
  return out
}

function setToken(
  list: readonly Token[],
  k: number,
  inputs: Readonly<Record<string, number>> | undefined,
): Runs {
  const { kind, text } = list[k]!
  if (kind === 'number') return setNumber(Number(text))
  if (kind === 'name') {
    const calls = list[k + 1]?.text === '('
    if (calls) return Object.hasOwn(FUNCTIONS, text) ? [base(FUNCTIONS[text]!)] : setSymbol(text)
    const value = inputs !== undefined && Object.hasOwn(inputs, text) ? inputs[text] : undefined
    return value === undefined ? setSymbol(text) : substituted(value, list[k + 1]?.text === '^')
  }
  if (text === '-' && isSign(list[k - 1])) return [base('−')]
  if (text === '*' && followsDivision(list, k)) return [base(' · ')]
  return [base(MARKS[text] ?? text)]
}

/**
 * True when a division stands before this product in the same term: `a / 3·b` set tightly would be read as
 * a over 3b, while it means a third of a, times b.
 */
function followsDivision(list: readonly Token[], k: number): boolean {
  let depth = 0
  for (let at = k - 1; at >= 0; at--) {
    const { kind, text } = list[at]!
    if (kind !== 'mark') continue
    if (text === ')') depth++
    else if (text === '(' && --depth < 0) return false
    else if (depth === 0 && text === '/') return true
    else if (depth === 0 && /^[-+,?:<>=]/.test(text)) return false
  }
  return false
}

const isSign = (before: Token | undefined): boolean =>
  before === undefined || (before.kind === 'mark' && before.text !== ')' && before.text !== ']')

/** Negative numbers, and powers of ten that are raised again, stand in brackets. */
function substituted(value: number, isRaised: boolean): Runs {
  const runs = setNumber(value)
  return value < 0 || (isRaised && runs.length > 1) ? [base('('), ...runs, base(')')] : runs
}

/** Where the exponent that starts at k ends: a sign, then one name, number, call or bracket. */
function exponentEnd(list: readonly Token[], k: number): number {
  let at = list[k]?.text === '-' ? k + 1 : k
  if (list[at]?.kind === 'name' && list[at + 1]?.text === '(') at++
  if (list[at]?.text !== '(') return at + 1
  let depth = 0
  for (; at < list.length; at++) {
    if (list[at]!.text === '(') depth++
    if (list[at]!.text === ')' && --depth === 0) return at + 1
  }
  return list.length
}

/** An exponent without a level of its own is raised; any other stays on the line behind a caret. */
function raised(list: readonly Token[], inputs: Readonly<Record<string, number>> | undefined): Runs {
  const isBracketed = list[0]?.text === '(' && list[list.length - 1]?.text === ')'
  const inner = setTokens(isBracketed ? list.slice(1, -1) : list, inputs)
  if (inner.every(({ level }) => level === 'base')) return [sup(plain(inner).replace(/ /g, ''))]
  return [base('^('), ...inner, base(')')]
}
