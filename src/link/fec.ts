import { formula } from '../derivation/formula.ts'

/** What a Reed–Solomon code makes of errors before it. */

/** A code over symbols of ten bits. */
export interface Code {
  /** Symbols of a codeword. */
  readonly n: number
  /** Symbols that it can mend. */
  readonly t: number
}

/** The codes of electrical lanes by name. Source: IEEE 802.3, clauses 91 and 119. */
export const CODES = {
  'RS(544,514)': { n: 544, t: 15 },
  'RS(528,514)': { n: 528, t: 7 },
} as const satisfies Readonly<Record<string, Code>>

/**
 * A symbol of ten bits fails with any of them: p_s = 1 − (1 − p_b)^10, without cancellation.
 *
 * Source: law: probability of independent events.
 *
 * @param p_b bit error ratio, 0 … 1 [1]
 * @returns symbol error ratio [1]
 */
export const codeSymbolErrors = (p_b: number): number => -Math.expm1(10 * Math.log1p(-p_b))

/**
 * Codeword error ratio Σ_{i>t} C(n, i) p_s^i (1 − p_s)^(n − i), summed from its largest terms in logarithms.
 *
 * Range: 0 ≤ p_s ≤ 1. Error: relative 1e-11.
 * Source: law: binomial distribution; independent symbol errors, which bursts of decision feedback break unless the
 * lane precodes or interleaves.
 *
 * @param code the code
 * @param p_s error ratio of code symbols [1]
 * @returns codeword error ratio [1]
 */
export function codewordErrors({ n, t }: Code, p_s: number): number {
  if (p_s <= 0) return 0
  if (p_s >= 1) return 1
  const odds = p_s / (1 - p_s)
  let log = n * Math.log1p(-p_s)
  for (let i = 1; i <= t; i++) log += Math.log(((n - i + 1) / i) * odds)
  // Where most of the weight is at or below t the complement would cancel: terms above t are summed as they are.
  let sum = 0
  for (let i = t + 1; i <= n; i++) {
    log += Math.log(((n - i + 1) / i) * odds)
    const term = Math.exp(log)
    sum += term
    if (i > n * p_s && term < 1e-18 * sum) break
  }
  return Math.min(1, sum)
}

/** p_b = SER/log2 M: Gray-coded levels, one bit fails with a symbol. SER [1], M [1] → [1]. */
export const bitErrors = formula(
  {
    symbol: 'p_b',
    meaning: 'bit error ratio of Gray-coded levels',
    unit: '1',
    source: 'J. G. Proakis, Digital Communications, 4th edition 2001, 5.2',
  },
  (SER, M) => SER / Math.log2(M),
)
