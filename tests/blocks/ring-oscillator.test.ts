import { describe, expect, it } from 'vitest'
import {
  inverterRingFrequency,
  ringDemand,
  ringOscillator,
  ringStageGain,
} from '../../src/blocks/ring-oscillator.ts'
import { caseOf, nodeOf, type Overrides, outcomeOf, resultsOf, walkAll, worstMargin } from './bench.ts'

const ring = (over: Overrides = {}): Overrides => ({
  oscillator: { kind: 'ring', range: [6e9, 7e9], ...over },
})
const inverters = (over: Overrides = {}): Overrides => ring({ kind: 'CMOS-ring', stages: 5, ...over })

describe('a ring of current-mode stages', () => {
  it.each([3, 4, 5, 8])(
    'independent: the loop gain of %i stages is −1 at the frequency of the closed form',
    (N) => {
      const [f_T, l] = [200e9, 3]
      const A = ringStageGain.run(1, N) // the least gain
      const f = f_T / (ringDemand.run(1e9, l, 1, 1, N) / 1e9)
      const wRC = f / (f_T / (A * l)) // pole of a stage: f_T/(A ℓ)
      expect(A / Math.hypot(1, wRC)).toBeCloseTo(1, 12)
      expect(N * Math.atan(wRC)).toBeCloseTo(Math.PI, 12)
    },
  )

  it('law: the derived demand lies in the range of practice, 4 to 10 times f_max', () => {
    for (const nm of [65, 28, 16] as const) {
      const { required } = outcomeOf(caseOf(nm, ring()), ringOscillator, 'speed').derived!
      expect(required! / 7e9).toBeGreaterThan(4)
      expect(required! / 7e9).toBeLessThan(10)
    }
  })

  it('law: faster rings, more load, more reserve or a slower device lower the margin', () => {
    const margin = (over: Overrides) => worstMargin(caseOf(28, ring(over)), ringOscillator, 'speed')
    expect(margin({ range: [7e9, 8e9] })).toBeLessThan(margin({}))
    expect(margin({ fan_out: 2 })).toBeLessThan(margin({}))
    expect(margin({ reserve: 1.6 })).toBeLessThan(margin({}))
    const node = nodeOf(28)
    const slow = { ...node, nmos: { ...node.nmos, C_ext: 2 * node.nmos.C_ext } }
    expect(worstMargin(caseOf(slow, ring()), ringOscillator, 'speed')).toBeLessThan(margin({}))
  })

  it('fails below 1, never unknown, without an operating point', () => {
    const found = outcomeOf(caseOf(28, { ...ring(), supply: { voltage: 0.35 } }), ringOscillator, 'speed')
    expect(found.margin).toBeLessThan(1)
    expect(found.margin).toBeGreaterThan(0)
    expect(found.derived!.reason).toMatch(/no operating point/)
  })
})

describe('a ring of inverters', () => {
  it('independent: five stages of 10 ps fan-out-of-four delay give 13.3 GHz', () => {
    expect(inverterRingFrequency.run(5, 10e-12) / 13.3333e9).toBeCloseTo(1, 5)
  })

  it('law: at the datum (typical, 300 K, nominal core supply) the delay is the published one', () => {
    const node = nodeOf(28)
    const at = { corner: 'typical', T: 300, c_mu: 1, dV_T: 0, dV_age: 0, tol_V: 0 } as const
    const found = outcomeOf(caseOf(node, inverters()), ringOscillator, 'frequency', at)
    expect(found.available! / inverterRingFrequency.run(5, node.fo4)).toBeCloseTo(1, 9)
  })

  it('law: more stages or a lower supply lower the margin', () => {
    const margin = (over: Overrides) => worstMargin(caseOf(28, over), ringOscillator, 'frequency')
    expect(margin(inverters({ stages: 7 }))).toBeLessThan(margin(inverters()))
    expect(margin({ ...inverters(), supply: { core_voltage: 0.8 } })).toBeLessThan(margin(inverters()))
  })
})

describe('the ring oscillator as a sub-block', () => {
  const asked = (over: Overrides) => {
    const given = caseOf(28, over)
    return ringOscillator.checks
      .filter((check) => check.asked === undefined || check.asked(given))
      .map(({ name }) => name)
  }

  it('asks each kind its own checks, and nothing of an LC tank', () => {
    expect(asked(ring())).toEqual(['speed', 'headroom', 'range'])
    expect(asked(inverters())).toEqual(['frequency', 'range'])
    expect(ringOscillator.asked(caseOf(28, ring({ kind: 'LC' }))).yes).toBe(false)
    expect(ringOscillator.asked(caseOf(28)).yes).toBe(false)
  })

  it('names its results', () => {
    expect(
      resultsOf(caseOf(28, ring()), ringOscillator)['device.ring_oscillator.fT_Hz']!.value,
    ).toBeGreaterThan(0)
    expect(
      resultsOf(caseOf(28, inverters()), ringOscillator)['ring_oscillator.highest_Hz']!.value,
    ).toBeGreaterThan(0)
  })

  it.each([
    ['current mode, passing', 16, ring()],
    ['current mode, failing', 180, ring({ stages: 3 })],
    ['inverters, passing', 16, inverters()],
    ['inverters, failing', 180, inverters()],
    ['current mode, no operating point', 28, { ...ring(), supply: { voltage: 0.35 } }],
  ] as const)('evaluates with mathjs: %s', (_, nm, over) => {
    expect(walkAll(caseOf(nm, over), ringOscillator)).toBeGreaterThan(30)
  })
})
