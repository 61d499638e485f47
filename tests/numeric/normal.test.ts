import { describe, expect, it } from 'vitest'
import { upperTail, upperTailInverse } from '../../src/numeric/normal.ts'
import points from '../outside/fixtures/normal-points.json' with { type: 'json' }

const relative = (found: number, wanted: number): number => Math.abs(found / wanted - 1)

describe('the normal tail', () => {
  it.each(points.tail)('independent: Q($x) as SciPy computes it', ({ x, Q }) => {
    expect(relative(upperTail(x), Q)).toBeLessThan(1e-12)
  })

  it('law: both tails make one, and the tail falls strictly, also across the change of method', () => {
    for (const x of [0, 0.3, 1, 2.5, 3, 6, 8]) expect(upperTail(x) + upperTail(-x)).toBeCloseTo(1, 15)
    for (let x = -5; x < 30; x += 0.05) expect(upperTail(x + 0.05)).toBeLessThan(upperTail(x))
    expect(relative(upperTail(2.5 + 1e-9), upperTail(2.5))).toBeLessThan(1e-7)
  })
})

describe('the normal quantile', () => {
  it.each(points.quantile)('independent: the quantile at $p as SciPy computes it', ({ p, x }) => {
    expect(Math.abs(upperTailInverse(p) - x)).toBeLessThan(1e-12 * Math.max(1, Math.abs(x)))
  })

  // values.json Q01: Abramowitz & Stegun 1964, ch. 26; tolerance 1e-4 relative.
  it.each([
    [1e-3, 3.09023],
    [1e-4, 3.71902],
    [2.4e-4, 3.49168],
    [1e-5, 4.26489],
    [1e-6, 4.75342],
    [1e-8, 5.612],
    [1e-9, 5.99781],
    [1e-10, 6.36134],
    [1e-12, 7.03448],
    [1e-15, 7.94135],
  ])('published: Q at an error ratio of %s is %s', (p, x) => {
    expect(relative(upperTailInverse(p), x)).toBeLessThan(1e-4)
  })

  it('law: it undoes the tail', () => {
    for (let x = 0.2; x < 36; x += 0.37)
      expect(relative(upperTailInverse(upperTail(x)), x)).toBeLessThan(1e-12)
  })

  it('refuses what is no probability', () => {
    for (const p of [0, 1, -0.1, 1.1, Number.NaN]) expect(() => upperTailInverse(p)).toThrow(RangeError)
  })
})
