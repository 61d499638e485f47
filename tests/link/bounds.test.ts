import { describe, expect, it } from 'vitest'
import {
  type Folded,
  folded,
  linearBound,
  matchedFilter,
  salz,
  symbolPower,
  zeroForcingFeedback,
  zeroForcingLinear,
} from '../../src/link/bounds/salz.ts'

const dB = (ratio: number): number => 10 * Math.log10(ratio)

describe('bounds of the folded spectrum', () => {
  // values.json C13–C17: J. Salz, BSTJ 52(8), 1973, formula evaluated with SciPy; folds −40 … 40; tolerance 0.01 dB.
  it.each([
    ['C13', 26562500000, 4, 4.9391593, 0.90352941, [47.2547, 40.122, 40.1208, 34.4711]],
    ['C14', 53125000000, 4, 3.2596788, 0.42164706, [44.7073, 38.3246, 38.3232, 33.2338]],
    ['C15', 53125000000, 2, 3.2596788, 0.42164706, [47.26, 40.8767, 40.8759, 35.7851]],
    ['C16', 106250000000, 4, 2.4695796, 0.33882353, [40.5884, 31.0739, 31.057, 23.317]],
    ['C17', 25781250000, 2, 5.8490092, 1.0860606, [48.8776, 39.7779, 39.7761, 32.6752]],
  ] as const)('published: %s', (_, f_B, M, a, b, [mfb, dfe, zf, le]) => {
    const sinc = (x: number): number => (x === 0 ? 1 : Math.sin(Math.PI * x) / (Math.PI * x))
    const pulse = (f: number): number =>
      (0.4 / f_B) * Math.abs(sinc(f / f_B)) * 10 ** (-(a * Math.sqrt(f / 1e9) + b * (f / 1e9)) / 20)
    const spectrum = folded(pulse, f_B, symbolPower.run(M), 8.2e-18, 40)
    expect(Math.abs(dB(matchedFilter(spectrum)) - mfb)).toBeLessThan(0.01)
    expect(Math.abs(dB(salz(spectrum)) - dfe)).toBeLessThan(0.01)
    expect(Math.abs(dB(zeroForcingFeedback(spectrum)) - zf)).toBeLessThan(0.01)
    expect(Math.abs(dB(linearBound(spectrum)) - le)).toBeLessThan(0.01)
  })

  // values.json C12: 1 + 0.9 D, σ² = 0.181; J. M. Cioffi, EE379A reader, chapter 3.
  it('published: C12, the textbook channel', () => {
    const gamma = Float64Array.from({ length: 4096 }, (_, k) => {
      const w = ((k + 0.5) / 4096) * Math.PI
      return (1.81 + 1.8 * Math.cos(w)) / 0.181
    })
    const spectrum: Folded = { gamma }
    expect(dB(matchedFilter(spectrum))).toBeCloseTo(10, 3)
    expect(dB(zeroForcingLinear(spectrum))).toBeCloseTo(0.21075, 3)
    expect(dB(linearBound(spectrum))).toBeCloseTo(5.68351, 3)
    expect(dB(zeroForcingFeedback(spectrum))).toBeCloseTo(7.42321, 3)
    expect(dB(salz(spectrum))).toBeCloseTo(8.35731, 3)
  })

  it('published: C19, on a flat channel all bounds are one', () => {
    const spectrum: Folded = { gamma: new Float64Array(64).fill(100) }
    for (const bound of [matchedFilter, salz, zeroForcingFeedback, linearBound, zeroForcingLinear])
      expect(dB(bound(spectrum))).toBeCloseTo(20, 9)
  })

  it('law: linear ≤ feedback ≤ matched filter', () => {
    const gamma = Float64Array.from({ length: 100 }, (_, k) => 1000 * Math.exp(-k / 12))
    const [le, dfe, mfb] = [linearBound({ gamma }), salz({ gamma }), matchedFilter({ gamma })]
    expect(le).toBeLessThan(dfe)
    expect(dfe).toBeLessThan(mfb)
  })
})
