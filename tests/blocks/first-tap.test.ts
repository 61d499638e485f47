import { describe, expect, it } from 'vitest'
import { dataSlicers, directLoopDemand, unrolledLoopDemand } from '../../src/blocks/feedback-loop.ts'
import { firstTap } from '../../src/blocks/first-tap.ts'
import { caseOf, nodeOf, type Overrides, outcomeOf, resultsOf, walkAll, worstMargin } from './bench.ts'

const tap = (receiver: Overrides = {}, more: Overrides = {}): Overrides => ({
  receiver: { dfe_taps: 1, ...receiver },
  ...more,
})
const margin = (over: Overrides, nm: 28 | 16 = 16) => worstMargin(caseOf(nm, over), firstTap, 'speed')
const KINDS: readonly Overrides[] = [
  { sampler: 'dynamic-latch', dfe: 'direct' },
  { sampler: 'dynamic-latch', dfe: 'unrolled' },
  { sampler: 'flip-flop', dfe: 'direct' },
  { sampler: 'flip-flop', dfe: 'unrolled' },
]

describe('the loop of the first tap', () => {
  it('independent: at the demanded speed the parts of the direct loop fill one unit interval', () => {
    const [kappa, A, l, eps, beta, UI] = [3.9, 1.41, 4.2, 0.05, 1.57, 35e-12]
    const f_T = directLoopDemand.run(kappa, 1.5, 6, 3.5, A, l, eps, beta, UI)
    const [tau_r, tau_s] = [kappa / (2 * Math.PI * f_T), (A * l) / beta / (2 * Math.PI * f_T)]
    expect((tau_r * (1.5 + 6 + 3.5) + tau_s * Math.log(1 / eps)) / UI).toBeCloseTo(1, 12)
  })

  it('independent: the unrolled loop settles to a tenth and catches within one unit interval', () => {
    const [A, l, kappa, UI] = [1.4, 3.5, 3.5, 35e-12]
    const tau = 1 / (2 * Math.PI * unrolledLoopDemand.run(A, l, 1, kappa, UI))
    expect((A * l * Math.LN10 * tau + kappa * tau) / UI).toBeCloseTo(1, 12)
  })

  // Method, section 3: PAM-4 takes 3 slicers direct and 12 with one unrolled tap, the error slicer apart.
  it.each([
    [2, false, 1],
    [2, true, 2],
    [4, false, 3],
    [4, true, 12],
    [8, true, 56],
  ])('published: PAM-%i, unrolled %s, takes %i data slicers a phase', (levels, unrolled, slicers) => {
    expect(dataSlicers(levels, unrolled)).toBe(slicers)
  })

  it('states the slicers of its own modulation', () => {
    const count = (over: Overrides) => resultsOf(caseOf(16, over), firstTap)['first_tap.data_slicers']!.value
    expect(count(tap())).toBe(3)
    expect(count(tap({ dfe: 'unrolled' }))).toBe(12)
    expect(count(tap({}, { modulation: 'PAM-2' }))).toBe(1)
  })
})

describe('checks of the first tap', () => {
  it.each(KINDS)('law: a higher rate lowers the margin, less overlap raises it: %o', (kind) => {
    expect(margin(tap(kind, { data_rate: 112e9 }))).toBeLessThan(margin(tap(kind)))
    const node = nodeOf(16)
    const light = { ...node, nmos: { ...node.nmos, C_ext: 0.5 * node.nmos.C_ext } }
    expect(worstMargin(caseOf(light, tap(kind)), firstTap, 'speed')).toBeGreaterThan(margin(tap(kind)))
  })

  it('law: a finer settling error or a smaller input lowers the margin of a direct loop', () => {
    const derived = { demand: { route: 'derived' } }
    for (const sampler of ['dynamic-latch', 'flip-flop']) {
      const at = (more: Overrides) => margin(tap({ sampler, ...more }, derived))
      expect(at({ dfe_settling: 0.01 })).toBeLessThan(at({}))
      expect(at({ smallest_input: 1e-3 })).toBeLessThan(at({}))
    }
  })

  it('law: unrolling relaxes the loop', () => {
    for (const sampler of ['dynamic-latch', 'flip-flop']) {
      const required = (dfe: string) =>
        outcomeOf(caseOf(16, tap({ sampler, dfe })), firstTap, 'speed').derived!.required!
      expect(required('unrolled')).toBeLessThan(required('direct'))
    }
  })

  it('law: the dynamic multiple applies where the slicer decides inside the loop', () => {
    const rule = (kind: Overrides) =>
      outcomeOf(caseOf(16, tap(kind)), firstTap, 'speed').rule!.required! / 28e9
    expect(KINDS.map((kind) => Math.round(rule(kind)))).toEqual([6, 3, 3, 3])
  })

  // limits.json L17: direct feedback at 28 GBd needed 16 nm fins.
  it('published: direct feedback at 28 GBd is at its edge at 16 nm and out of reach at 28 nm', () => {
    const typical = (nm: 28 | 16) => {
      const over = tap({}, { modulation: 'PAM-2', data_rate: 28e9 })
      return outcomeOf(caseOf(nm, over), firstTap, 'speed').margin!
    }
    expect(typical(28)).toBeLessThan(1)
    expect(typical(16)).toBeGreaterThan(typical(28))
    expect(Math.abs(typical(16) - 1)).toBeLessThan(0.15)
  })

  it('is asked of slicers with feedback', () => {
    expect(firstTap.asked(caseOf(16)).yes).toBe(false)
    expect(firstTap.asked(caseOf(16, tap())).yes).toBe(true)
    expect(firstTap.asked(caseOf(16, tap({ kind: 'converter' }))).yes).toBe(false)
  })

  it('fails below 1, never unknown, without an operating point', () => {
    for (const name of ['speed', 'headroom']) {
      const over = tap({ sampler: 'flip-flop' }, { supply: { voltage: 0.4 } })
      const found = outcomeOf(caseOf(28, over), firstTap, name)
      expect(found.margin).toBeLessThan(1)
      expect(found.margin).toBeGreaterThan(0)
    }
  })

  it.each(KINDS.flatMap((kind) => [16, 180].map((nm) => [nm as 16 | 180, kind] as const)))(
    'evaluates with mathjs: %i nm, %o',
    (nm, kind) => {
      expect(walkAll(caseOf(nm, tap(kind)), firstTap)).toBeGreaterThan(100)
    },
  )

  it.each([0.4, 1.2])('evaluates with mathjs at %s V', (voltage) => {
    expect(
      walkAll(caseOf(28, tap({ sampler: 'flip-flop' }, { supply: { voltage } })), firstTap),
    ).toBeGreaterThan(100)
  })
})
