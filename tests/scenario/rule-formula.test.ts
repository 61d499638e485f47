import { evaluate } from 'mathjs'
import { beforeAll, describe, expect, it } from 'vitest'
import { readScenario } from '../../src/scenario/read.ts'
import { type FormulaParser, loadFormulaParser, readRule } from '../../src/scenario/rule-formula.ts'
import { accessTo, faultsOf, link } from './scenarios.ts'

const PLACE = { file: 'a.yaml', line: 1, column: 1 }
const LANES = [
  { f_op: 14e9, f_B: 28e9, f_N: 14e9, f_ck: 7e9, f_osc: 14e9, beta: 1.57, k: 3 },
  { f_op: 9.7e9, f_B: 5.3e9, f_N: 2.65e9, f_ck: 5.3e9, f_osc: 10.6e9, beta: 0.71, k: 7.9 },
]

let parse: FormulaParser
beforeAll(async () => {
  parse = await loadFormulaParser()
})

describe('independent: arithmetic gives what mathjs gives', () => {
  it.each([
    '3 * f_op / beta',
    'k*f_op^2/f_B',
    'f_op',
    '+f_op',
    '0x10 * f_op',
    '.5e1 * f_op',
    'max(2*f_N, sqrt(f_B*f_ck), k*min(f_op, f_ck))',
    '-(-f_osc) + 2^3^2',
    '-2^2 + f_op',
    'f_op - -k',
    '2^-k * f_op',
    'f_op / f_B / f_N * f_ck * f_osc',
    'f_op - f_ck - f_N + 3 * f_B',
    'k + f_op * 2 ^ beta - 1',
    'abs(f_ck - f_osc) * log10(1000) * exp(0) + log(exp(1)) * f_op',
    '((((k)))) * (f_op + (f_B - f_N))',
    'sqrt(f_op) ^ 2 * (1 + 1/k)',
  ])('%s', (text) => {
    const read = readRule(text, PLACE, parse)
    if (!read.ok) throw new Error(read.fault.found)
    for (const inputs of LANES) expect(read.rule.run(inputs)).toBe(evaluate(text, { ...inputs }))
  })
})

const ESCAPES = [
  'f_op.constructor',
  "f_op['constructor']",
  'f_op["constructor"]["constructor"]("return 1")()',
  'constructor',
  '__proto__',
  'toString()',
  'hasOwnProperty(f_op)',
  'constructor(1)',
  'sqrt.constructor(1)',
  'sqrt.call(k, 1)',
  '(sqrt)(4)(2)',
  'import({}, {})',
  'createUnit(k)',
  'parse(k)',
  'evaluate(k)',
  'compile(k)',
  'simplify(k)',
  'derivative(k, k)',
  'parser()',
  'config({})',
  'typed(k)',
  'chain(k).done()',
  'f(x) = x',
  'k = 4',
  'sqrt = abs',
  'f_op; k',
  'f_op\nk',
  '[1, 2]',
  '{a: 1}',
  '"f_op"',
  "'f_op'",
  '1:3',
  'f_op > 3 ? 1 : 2',
  'f_op > 3',
  'f_op == f_op',
  'f_op!',
  'k %',
  'k % 2',
  'k mod 2',
  'k .* 2',
  'k .^ 2',
  "k'",
  'k | 2',
  'k & 2',
  '~k',
  'k << 2',
  'k and k',
  'k xor k',
  'not k',
  'k to f_op',
  'k in cm',
  '2 f_op',
  'k(f_op)',
  '(k)(f_op)',
  '2(f_op)',
  '5 cm',
  '5 GHz',
  'pi * f_op',
  'e',
  'i',
  'Infinity',
  'NaN',
  'true',
  'null',
  'undefined',
  'end',
  'cos(f_op)',
  'gamma(k)',
  'random()',
  'ones(9999)',
  'range(1, 1e9)',
  'factorial(k)',
  'max()',
  'sqrt()',
  'sqrt(1, 2)',
  'log(f_op, 2)',
  'max([1, 2])',
  'f_op # k',
  '$f_op',
  'ｆ_op',
  'f＿op',
  'к * f_op',
  'β * f_op',
  'f_op × k',
  'f_op ÷ k',
  'f_op − k',
  'f_op²',
  'f_op\u200b',
  'F_op',
  '1/0 * f_op',
  '0 / 0',
  '-f_op',
  'sqrt(-f_op)',
  '1e999',
  '',
  ' ',
  'f_op *',
  '* f_op',
  'f_op)',
  `${'('.repeat(60)}f_op${')'.repeat(60)}`,
  `${'-'.repeat(100)}f_op`,
  `f_op${'^2'.repeat(60)}`,
  `f_op${' + 1'.repeat(60)}`,
]

describe('everything else is refused', () => {
  it.each(ESCAPES)('%j', (text) => {
    const read = readRule(text, PLACE, parse)
    expect(read.ok ? 'read' : read.fault.code).toBe('rule.form')
  })

  it('leaves nothing behind', () => {
    expect(evaluate('2 + 2')).toBe(4)
    expect(() => evaluate('k')).toThrow('Undefined symbol')
    expect(Object.keys(Object.prototype)).toEqual([])
  })
})

describe('in a scenario', () => {
  const rule = (text: string) => link({ demand: `{formulas: {driver: ${JSON.stringify(text)}}}` })

  it('the rule of a sub-block runs', async () => {
    const read = await readScenario(rule('3 * f_op / beta'), 'a.yaml', accessTo())
    if (!read.ok) throw new Error(JSON.stringify(read.faults))
    expect(read.value.options[0]!.rules.driver!.run(LANES[0]!)).toBe((3 * 14e9) / 1.57)
    expect(Object.keys(read.value.options[0]!.rules)).toEqual(['driver'])
  })

  it.each(ESCAPES.filter((text) => text.trim() !== '' && text.length <= 200))(
    'one fault at its place: %j',
    async (text) => {
      expect(await faultsOf(rule(text))).toMatchObject([{ code: 'rule.form', line: 9, column: 29 }])
    },
  )

  it('one that is too long is told as such', async () => {
    const found = await faultsOf(rule(`f_op${' + 1'.repeat(60)}`))
    expect(found.map(({ code }) => code)).toEqual(['text.too-long'])
  })
})
