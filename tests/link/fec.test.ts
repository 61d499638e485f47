import { describe, expect, it } from 'vitest'
import { bitErrors, CODES, codeSymbolErrors, codewordErrors } from '../../src/link/fec.ts'

const errors = (code: keyof typeof CODES, p_b: number): number =>
  codewordErrors(CODES[code], codeSymbolErrors(p_b))

const within = (found: number, expected: number, share: number): void =>
  expect(Math.abs(found / expected - 1)).toBeLessThan(share)

describe('error correction', () => {
  // values.json Q14: IEEE 802.3 clauses 91/119, RS(544,514), recomputed with SciPy; tolerance 1 %.
  it.each([
    [1e-4, 1.35981e-18],
    [2.4e-4, 8.15157e-13],
    [3.2e-4, 5.44481e-11],
    [1e-3, 1.53026e-4],
  ])('independent: Q14, RS(544,514) at %s', (p_b, expected) =>
    within(errors('RS(544,514)', p_b), expected, 1e-5),
  )

  // values.json Q15: IEEE 802.3bj-2014, clause 91, RS(528,514), recomputed with SciPy; tolerance 1 %.
  it.each([
    [1e-6, 1.4138e-23],
    [1e-5, 1.35577e-15],
    [5e-5, 4.39709e-10],
  ])('independent: Q15, RS(528,514) at %s', (p_b, expected) =>
    within(errors('RS(528,514)', p_b), expected, 1e-4),
  )

  // values.json Q14 and Q15: the bit error ratios at which a codeword fails once in 1e12 or 1e15.
  it.each([
    ['RS(544,514)', 2.4334e-4, 1e-12],
    ['RS(544,514)', 1.53632e-4, 1e-15],
    ['RS(528,514)', 2.30018e-5, 1e-12],
  ] as const)('independent: %s fails at %s with %s', (code, p_b, expected) =>
    within(errors(code, p_b), expected, 1e-3),
  )

  it('law: what a code mends and what it does not make one', () => {
    const [n, p, t] = [20, 0.15, 3]
    const chosen = [1, 20, 190, 1140]
    const mended = chosen.reduce((sum, ways, i) => sum + ways * p ** i * (1 - p) ** (n - i), 0)
    within(codewordErrors({ n, t }, p), 1 - mended, 1e-12)
  })

  it('law: a code that mends nothing fails with any symbol', () => {
    within(codewordErrors({ n: 40, t: 0 }, 0.01), 1 - 0.99 ** 40, 1e-12)
  })

  it('law: certain and absent errors are certain and absent', () => {
    expect(codewordErrors(CODES['RS(544,514)'], 0)).toBe(0)
    expect(codewordErrors(CODES['RS(544,514)'], 1)).toBe(1)
  })

  it('law: more errors before the code leave more behind it', () => {
    const ratios = [1e-6, 1e-5, 1e-4, 1e-3, 1e-2].map((p) => errors('RS(528,514)', p))
    for (let k = 1; k < ratios.length; k++) expect(ratios[k]!).toBeGreaterThan(ratios[k - 1]!)
  })

  // Method 7: Gray-coded bit errors are half the PAM-4 symbol errors.
  it('published: half of the PAM-4 symbol errors', () => expect(bitErrors.run(1e-4, 4)).toBe(5e-5))
})
