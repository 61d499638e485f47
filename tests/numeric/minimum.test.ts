import { describe, expect, it } from 'vitest'
import { leastOn } from '../../src/numeric/minimum.ts'

describe('least value on an interval', () => {
  it.each([
    ['a parabola', (x: number) => (x - 1.234) ** 2, 1.234],
    ['a quartic', (x: number) => (x + 2.5) ** 4, -2.5],
    ['a kink', (x: number) => Math.abs(x - 0.3), 0.3],
    ['the lower of two valleys', (x: number) => Math.min((x + 3) ** 2 + 0.1, (x - 3) ** 2), 3],
  ])('law: finds %s', (_, f, at) => {
    const { x, atEnd } = leastOn(f, -5, 5, 11, 1e-5)
    expect(x).toBeCloseTo(at, 1)
    expect(f(x)).toBeLessThan(f(at) + 1e-4)
    expect(atEnd).toBeNull()
  })

  it('law: tells when it lies at an end', () => {
    expect(leastOn((x) => x, 1, 4, 7, 1e-4)).toEqual({ x: 1, atEnd: 'from' })
    expect(leastOn((x) => -x, 1, 4, 7, 1e-4)).toEqual({ x: 4, atEnd: 'to' })
  })

  it('law: the place is as good as the tolerance says where the function is curved', () => {
    const { x } = leastOn((at) => Math.exp(at) - 2 * at, -3, 3, 9, 1e-6)
    expect(Math.abs(x - Math.LN2)).toBeLessThan(1e-5)
  })
})
