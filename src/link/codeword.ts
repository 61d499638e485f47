import type { Bench } from '../blocks/bench.ts'
import { LEVELS } from '../blocks/converter-need.ts'
import { ASKED, type NamedResult, notAsked, type Outcome, subBlock } from '../blocks/sub-block.ts'
import { marginOfProbability } from '../derivation/margin.ts'
import { bracketedRoot } from '../numeric/root.ts'
import { bitErrors, CODES, type Code, codeSymbolErrors, codewordErrors } from './fec.ts'

/** The stated code at the stated error ratio of the detector. */

interface Coded {
  readonly p_b: number
  readonly p_cw: number
  /** Largest bit error ratio before the code that meets the target. */
  readonly most: number
}

const INDEPENDENT = 'law: binomial distribution; bit errors independent'
const SYMBOLS = {
  symbol: 'p_s',
  meaning: 'error ratio of ten-bit code symbols',
  unit: '1',
  source: INDEPENDENT,
  method: '1 − (1 − p_b)^10 without cancellation',
  error: 'rounding',
}
const CODEWORD = {
  symbol: 'p_cw',
  meaning: 'codeword error ratio',
  unit: '1',
  source: INDEPENDENT,
  method: 'sum of the binomial terms beyond what the code mends, in logarithms',
  error: '1e-11 relative',
}
const MOST = {
  symbol: 'p_b_max',
  meaning: 'largest bit error ratio before the code that meets the target',
  unit: '1',
  source: INDEPENDENT,
  method: 'root of the codeword error ratio over the logarithm of the bit error ratio',
  error: '1e-6 relative',
}

function prepare(bench: Bench): Coded {
  const { settings, rates, t, kept } = bench
  const { code, target } = settings.fec!
  const p_b = t.calc(bitErrors, settings.error_ratio!, t.leaf(LEVELS, rates.levels))
  const { n, t: mends } = CODES[code]
  const find = (): readonly [number, number] => [
    wordErrors(CODES[code], p_b),
    mostErrors(CODES[code], target),
  ]
  const [p_cw, most] = kept === undefined ? find() : kept.of('codeword', [n, mends, p_b, target], find)
  const p_s = t.kernel(SYMBOLS, codeSymbolErrors(p_b), t.recording ? { p_b } : undefined)
  return {
    p_b,
    p_cw: t.kernel(CODEWORD, p_cw, t.recording ? { p_s } : undefined),
    most: t.kernel(MOST, most, t.recording ? { p_target: target } : undefined),
  }
}

const wordErrors = (code: Code, p_b: number): number => codewordErrors(code, codeSymbolErrors(p_b))

/** Between these bit error ratios every target is crossed. */
const [LEAST, ALL] = [1e-12, 0.5]

function mostErrors(code: Code, target: number): number {
  const off = (log: number): number => Math.log(wordErrors(code, Math.exp(log))) - Math.log(target)
  return Math.exp(bracketedRoot(off, Math.log(LEAST), Math.log(ALL), 1e-8))
}

const BASIS = 'bit errors independent: bursts of decision feedback are not counted'

function codewordOutcome({ p_cw }: Coded, { settings, t }: Bench): Outcome {
  const { target } = settings.fec!
  // Below the least number that is told from nothing the logarithm has no value: the margin is then that of this number.
  const margin = t.calc(marginOfProbability, Math.max(p_cw, Number.MIN_VALUE), target)
  return { required: target, available: p_cw, margin, basis: BASIS }
}

const results = ({ p_b, p_cw, most }: Coded): readonly NamedResult[] => [
  { name: 'fec.bit_error_ratio', value: p_b, unit: '1', reason: 'before the code, Gray-coded levels' },
  { name: 'fec.codeword_error_ratio', value: p_cw, unit: '1', reason: BASIS },
  {
    name: 'fec.largest_bit_error_ratio',
    value: most,
    unit: '1',
    reason: 'before the code, to meet its target',
  },
]

/** The error-correcting code against its target. */
export const codeword = subBlock<Coded>({
  id: 'fec',
  title: 'Error correction',
  of: ['link'],
  asked: ({ settings }) =>
    settings.fec === null ? notAsked('the scenario states no error-correcting code') : ASKED,
  prepare,
  checks: [
    {
      name: 'codeword',
      title: 'Error correction: codeword error ratio',
      quantity: 'codeword error ratio',
      unit: '1',
      sense: 'at most',
      evaluate: codewordOutcome,
    },
  ],
  results,
})
