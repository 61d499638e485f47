import { describe, expect, it } from 'vitest'
import { solveSymmetric } from '../../src/numeric/symmetric.ts'

const rows = (...all: number[][]): Float64Array[] => all.map((row) => Float64Array.from(row))

describe('symmetric positive definite equations', () => {
  it('law: the solution satisfies them', () => {
    const n = 12
    const G = Array.from({ length: n }, (_, i) =>
      Array.from({ length: n }, (_, j) => Math.sin(3 * i + j * j) + (i === j ? 2 : 0)),
    )
    const A = G.map((a) => G.map((b) => a.reduce((sum, x, k) => sum + x * b[k]!, 0)))
    const x = Float64Array.from({ length: n }, (_, k) => k - 4.5)
    const b = Float64Array.from(A, (row) => row.reduce((sum, a, k) => sum + a * x[k]!, 0))
    expect(solveSymmetric(rows(...A), b)).toBe(true)
    b.forEach((value, k) => {
      expect(value).toBeCloseTo(x[k]!, 9)
    })
  })

  it('law: a matrix of two equal rows, or a negative one, has none', () => {
    expect(solveSymmetric(rows([1, 1], [1, 1]), Float64Array.of(1, 2))).toBe(false)
    expect(solveSymmetric(rows([-1]), Float64Array.of(1))).toBe(false)
    expect(solveSymmetric(rows([Number.NaN]), Float64Array.of(1))).toBe(false)
  })
})
