import { describe, expect, it } from 'vitest'
import {
  logSpaced,
  placesOf,
  powerLawAt,
  powerLawIntegral,
  powerLawMoments,
  risesOf,
} from '../../src/numeric/power-law.ts'

const x = logSpaced(3, 7e5, 2)

describe('integral in log-log', () => {
  it.each([-3, -2, -1.5, -1, -0.999999999, 0, 1, 2.5])('law: x^%d is exact on few points', (n) => {
    const found = powerLawIntegral(
      x,
      x.map((at) => at ** n),
    )
    const [a, b] = [3, 7e5]
    // So close to −1 the closed form loses its digits, and the limit is good to parts in 10⁸.
    const exact = Math.abs(n + 1) < 1e-8 ? Math.log(b / a) : (b ** (n + 1) - a ** (n + 1)) / (n + 1)
    expect(found / exact).toBeCloseTo(1, 7)
  })

  it('law: of neighbouring stretches add up', () => {
    const y = x.map((at) => 1 / (1 + at / 100))
    const cut = 5
    const parts =
      powerLawIntegral(x.subarray(0, cut + 1), y.subarray(0, cut + 1)) +
      powerLawIntegral(x.subarray(cut), y.subarray(cut))
    expect(parts / powerLawIntegral(x, y)).toBeCloseTo(1, 12)
  })

  it('law: a segment that touches zero is a triangle; a weight multiplies', () => {
    expect(powerLawIntegral([1, 3], [2, 0])).toBe(2)
    expect(powerLawIntegral([1, 3, 5], [0, 0, 0])).toBe(0)
    expect(powerLawIntegral([1, 3], [2, 4], [1, 0])).toBe(2)
    expect(powerLawIntegral([1], [2])).toBe(0)
  })

  it('law: moments are the integrals of y/x^n', () => {
    const y = x.map((at) => (1 + at / 50) ** -1.7)
    const moments = powerLawMoments(placesOf(x), y, risesOf(y), 3)
    for (const [n, moment] of moments.entries()) {
      const direct = powerLawIntegral(
        x,
        y.map((one, k) => one / x[k]! ** n),
      )
      expect(moment / direct).toBeCloseTo(1, 10)
    }
  })

  it('law: values between points lie on the power law, outside they are the ends', () => {
    const [xs, ys] = [
      [1, 10, 1000],
      [1, 100, 1],
    ]
    expect(powerLawAt(xs, ys, 2)).toBeCloseTo(4, 12)
    expect(powerLawAt(xs, ys, 100)).toBeCloseTo(10, 12)
    expect(powerLawAt(xs, ys, 10)).toBeCloseTo(100, 10)
    expect([powerLawAt(xs, ys, 0.5), powerLawAt(xs, ys, 2000)]).toEqual([1, 1])
  })

  it('law: places are even in the logarithm and hold both ends', () => {
    const places = logSpaced(1e3, 1e9, 10)
    expect([places[0], places.at(-1), places.length]).toEqual([1e3, 1e9, 61])
    const ratios = new Set([...places.slice(1)].map((at, k) => (at / places[k]!).toFixed(9)))
    expect(ratios.size).toBe(1)
  })
})
