import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { loopIntegrals, type ShapeIntegrals } from '../../src/clocking/loop/integrals.ts'
import type { LoopProblem } from '../../src/clocking/loop/problem.ts'
import { poleZeroRoot } from '../../src/clocking/loop/shape.ts'
import { problem } from './problems.ts'

type Shapes = Readonly<Partial<Record<keyof ShapeIntegrals, number>>>
interface Made {
  readonly f_c: number
  readonly phi: number
  readonly f_ref: number
  readonly delayed: boolean
  readonly f_CDR: number
  readonly f_1: number
  readonly f_2: number
  readonly order: number
  readonly r: number
  readonly plain: Shapes
  readonly tracked: Shapes
}

// Adaptive quadrature with SciPy 1.17.1, see tests/outside/makers/clock_integrals.py.
const MADE = JSON.parse(
  readFileSync(new URL('../outside/fixtures/clock-integrals.json', import.meta.url), 'utf8'),
) as readonly Made[]

const problemOf = ({ f_ref, delayed, f_CDR, f_1, f_2, order, r }: Made): LoopProblem =>
  problem({ f_ref, delayed, f_CDR, f_1, f_2, r, filter: 1, low: { modulator: 1, order } })

describe.each(MADE)('loop of $f_c Hz on a reference of $f_ref Hz', (made) => {
  it('law: √b of its phase margin', () => {
    expect(poleZeroRoot.run(made.phi) / made.r).toBeCloseTo(1, 12)
  })

  const found = loopIntegrals(problemOf(made), made.f_c)
  const both = [
    ['plain', found.plain, made.plain],
    ['tracked', found.tracked!, made.tracked],
  ] as const
  it.each(both)(
    'independent: %s integrals agree with adaptive quadrature, so that jitter does to 1e-4',
    (_, ours, theirs) => {
      const names = Object.keys(theirs) as (keyof ShapeIntegrals)[]
      expect(names.length).toBe(8)
      for (const name of names) {
        // Jitter is the root of an integral, so 2e-4 here is 1e-4 there. A modulator of fourth order rises with f⁶.
        const most = name === 'lowModulator' && made.order > 3 ? 4e-4 : 2e-4
        expect(Math.abs(ours[name] / theirs[name]! - 1), name).toBeLessThan(most)
      }
    },
  )
})
