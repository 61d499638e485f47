import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { bracketedRoot, rootBetween } from '../../src/numeric/root.ts'

const FUNCTIONS: Readonly<Record<string, (x: number) => number>> = {
  cubic: (x) => x ** 3 - 2 * x - 5,
  quintic: (x) => x ** 5 - x - 1,
  triple: (x) => (x - 0.7) ** 3,
  cosine: (x) => Math.cos(x) - x,
  logarithm: (x) => 2 * Math.exp(x) + x - 3,
  steep: (x) => Math.atan(1e6 * (x - 0.3)),
  flat: (x) => Math.exp(-x) - 1e-9,
  wide: (x) => Math.log(x) - 5,
}

interface Expected {
  readonly from: number
  readonly to: number
  readonly root: number
}
const { roots } = JSON.parse(
  readFileSync(new URL('../outside/fixtures/root-points.json', import.meta.url), 'utf8'),
) as { roots: Record<string, Expected> }

describe('roots against SciPy brentq (independent)', () => {
  test('every function of the fixture is tried', () => {
    expect(Object.keys(roots).sort()).toEqual(Object.keys(FUNCTIONS).sort())
  })

  test.each(Object.entries(roots))('%s', (name, { from, to, root }) => {
    const f = FUNCTIONS[name]!
    // A triple root is only as sharp as the cube root of the rounding of f: x − 0.7 itself is exact here.
    for (const relative of [1e-6, 1e-9, 1e-13]) {
      expect(Math.abs(bracketedRoot(f, from, to, relative) / root - 1)).toBeLessThan(relative + 1e-15)
      expect(Math.abs(bracketedRoot(f, to, from, relative) / root - 1)).toBeLessThan(relative + 1e-15)
    }
  })
})

describe('how the search behaves (law)', () => {
  test('a closer tolerance costs few calls: at most as many as bisection would need', () => {
    for (const [name, { from, to }] of Object.entries(roots)) {
      let calls = 0
      const counted = (x: number): number => {
        calls++
        return FUNCTIONS[name]!(x)
      }
      const found = bracketedRoot(counted, from, to, 1e-12)
      const bisections = Math.log2(Math.abs(to - from) / (1e-12 * Math.abs(found)))
      // The triple root is the worst case of interpolation; 1.6 is Chandrupatla's own figure for such.
      expect(calls).toBeLessThan(2 + 1.6 * bisections)
    }
  })

  test('never looks outside the bracket', () => {
    const seen: number[] = []
    bracketedRoot(
      (x) => {
        seen.push(x)
        return Math.exp(20 * x) - 3
      },
      -4,
      2,
    )
    expect(Math.min(...seen)).toBe(-4)
    expect(Math.max(...seen)).toBe(2)
  })

  test('an end that is a root is returned as it is', () => {
    expect(bracketedRoot((x) => x - 2, 2, 5)).toBe(2)
    expect(bracketedRoot((x) => x - 5, 2, 5)).toBe(5)
  })

  test('a root at zero is found though no relative tolerance can be met there', () => {
    expect(Math.abs(bracketedRoot((x) => Math.expm1(x), -1, 3, 1e-9))).toBeLessThan(1e-15)
  })

  test('ends of the same sign, or an end that is not a number, give NaN and no guess', () => {
    expect(bracketedRoot((x) => x * x + 1, -1, 1)).toBeNaN()
    expect(bracketedRoot((x) => -1 - x * x, -1, 1)).toBeNaN()
    expect(bracketedRoot(() => Number.NaN, -1, 1)).toBeNaN()
  })

  test('known end values are trusted, not computed again', () => {
    const seen: number[] = []
    const root = rootBetween(
      (x) => {
        seen.push(x)
        return x - 1
      },
      0,
      -1,
      3,
      2,
    )
    expect(root).toBeCloseTo(1, 9)
    expect(seen).not.toContain(0)
    expect(seen).not.toContain(3)
  })
})
