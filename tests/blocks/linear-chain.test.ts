import { describe, expect, it } from 'vitest'
import { chainDemand } from '../../src/blocks/linear-chain.ts'
import { PEAKING, shrink } from '../../src/blocks/load.ts'

/** Squared magnitude of a shunt-peaked stage, R = C = 1, L = m (values.json A10). */
function shuntPeaked(m: number, w: number): number {
  const [re, im] = [1, w * m]
  const [re_d, im_d] = [1 - w * w * m, w]
  return (re * re + im * im) / (re_d * re_d + im_d * im_d)
}

describe('the demand of a linear chain', () => {
  // values.json A10 (Mohan et al., JSSC 2000): m = √2 − 1 maximally flat, 1.72205; 0.322197 best delay, 1.57217.
  it.each([
    ['shunt-flat', Math.SQRT2 - 1],
    ['shunt-delay', 0.322197],
  ] as const)('independent: %s stages, cascaded here, are 3 dB down at the bandwidth asked', (kind, m) => {
    for (const n of [1, 2, 3, 4]) {
      const [BW, A, l] = [16.8e9, 1.41, 2.8]
      const f_T = chainDemand.run(BW, A, l, PEAKING[kind].widening, shrink(n, kind))
      const w = BW / (f_T / (A * l))
      expect(Math.abs(shuntPeaked(m, w) ** n / 0.5 - 1)).toBeLessThan(5e-3)
    }
  })
})
