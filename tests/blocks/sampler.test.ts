import { describe, expect, it } from 'vitest'
import { growth, regenerationTime, undecided } from '../../src/blocks/decision.ts'
import { divider } from '../../src/blocks/divider.ts'
import { dynamicLatchDemand, latchNoise, pairOffset } from '../../src/blocks/dynamic-latch.ts'
import { latchConstant, latchTime } from '../../src/blocks/flip-flop.ts'
import { sampler } from '../../src/blocks/sampler.ts'
import { caseOf, nodeOf, type Overrides, outcomeOf, resultsOf, walkAll, worstMargin } from './bench.ts'

const margin = (over: Overrides = {}, name = 'speed') => worstMargin(caseOf(28, over), sampler, name)
const flipFlop = (more: Overrides = {}): Overrides => ({ receiver: { sampler: 'flip-flop', ...more } })
const edges = (more: Overrides = {}): Overrides => ({ receiver: { edge_samplers: 'yes', ...more } })

describe('regeneration', () => {
  // values.json A18: g_m 1 mS on 5 fF, 100 ps, V_L 0.5 V, A0 5, V_range 0.2 V (Veendrick, IEEE JSSC 15(2), 1980).
  it('published: probability of an undecided sample as A18 states', () => {
    const tau = 5e-15 / 1e-3
    expect(tau).toBeCloseTo(5e-12, 20)
    expect(Math.abs(undecided.run(0.5, 5, 0.2, 1e-10, tau) / 1.03058e-9 - 1)).toBeLessThan(1e-4)
    expect(undecided.run(1, 1, 1, 27.631e-12, 1e-12) / 1e-12).toBeCloseTo(1, 3)
  })

  // values.json A19: τ = 5 ps, to 0.5 V from 1 mV and 10 mV.
  it('published: regeneration time as A19 states', () => {
    expect(Math.abs((5 * growth.run(0.5, 1, 1e-3)) / 31.073 - 1)).toBeLessThan(1e-4)
    expect(Math.abs((5 * growth.run(0.5, 1, 1e-2)) / 19.5601 - 1)).toBeLessThan(1e-4)
  })

  // values.json A20: Pelgrom et al., IEEE JSSC 24(5), 1989; W 4 µm, L 0.03 µm.
  it.each([
    [1e-9, 2.88675e-3],
    [2e-9, 5.7735e-3],
    [3.5e-9, 10.1036e-3],
  ])('published: offset at A_VT %s V·m as A20 states', (A_VT, sigma) => {
    expect(Math.abs(pairOffset.run(A_VT, 4e-6, 0.03e-6) / sigma - 1)).toBeLessThan(1e-4)
  })

  it('law: a probability never exceeds one nor vanishes', () => {
    expect(undecided.run(0.5, 3, 0.3, -1e-12, 1e-12)).toBe(1)
    expect(undecided.run(0.5, 3, 0.3, 1, 1e-12)).toBeGreaterThan(0)
  })

  it('law: noise falls with the root of the capacitance', () => {
    expect(latchNoise.run(1e-3, 10e-15, 40e-15)).toBeCloseTo(0.5e-3, 15)
  })

  it('independent: a ring of two latches that divides f_in oscillates at half of it, where each turns by a quarter', () => {
    // Two integrators of time constant τ in an inverting ring: ω = 1/τ; the ring divides f_in = 2 ω/2π.
    const [l, k, f_T] = [4.5, 1.32, 60e9]
    const f_in = (k * f_T) / l
    expect(latchTime.run(latchConstant.run(l, k, 1), f_T) * 2 * Math.PI * (f_in / 2)).toBeCloseTo(1, 12)
  })
})

describe('the dynamic latch', () => {
  // Method, section 3, sampler: 2.73 ps at 28 nm, 1.0 V, measured 2.78 ps. The test node has the starting values.
  it('published: time constant at 28 nm', () => {
    const found = resultsOf(caseOf(28, { supply: { core_voltage: 1 } }), sampler)
    const tau = found['sampler.time_constant_s']!.value!
    expect(Math.abs(tau / 2.78e-12 - 1)).toBeLessThan(0.05)
    expect(tau).toBeCloseTo(regenerationTime.run(2.6, found['device.sampler.fT_Hz']!.value!), 20)
  })

  it('independent: at the demanded speed integration, reset and regeneration fill half a period', () => {
    const [f_d, G] = [14e9, 3.5]
    const tau = regenerationTime.run(2.6, dynamicLatchDemand.run(2.6, 6, G, f_d))
    expect(tau * (6 + G) * 2 * f_d).toBeCloseTo(1, 12)
  })

  it('law: higher rate, smaller input and less supply lower the margin', () => {
    expect(margin({ data_rate: 112e9 })).toBeLessThan(margin())
    expect(margin({ receiver: { smallest_input: 1e-3 } })).toBeLessThan(margin())
    expect(margin({ supply: { core_voltage: 0.6 } })).toBeLessThan(margin())
    expect(margin({ clocking: 'quarter-rate' })).toBeGreaterThan(margin())
    const node = nodeOf(28)
    const light = { ...node, nmos: { ...node.nmos, C_lay: 0.5 * node.nmos.C_lay } }
    expect(worstMargin(caseOf(light), sampler, 'speed')).toBeGreaterThan(margin())
  })

  it('law: a larger supply than the gate voltage needs changes nothing in the derived route', () => {
    const derived = (core_voltage: number) =>
      outcomeOf(caseOf(28, { supply: { core_voltage } }), sampler, 'speed').derived!.available
    expect(derived(0.95)).toBe(derived(1.1))
    expect(derived(0.6)).toBeLessThan(derived(0.95)!)
  })

  it("law: a converter's decisions run at the rate of its sub-converters", () => {
    const at = (sub_converters: number) =>
      outcomeOf(
        caseOf(28, { receiver: { kind: 'converter', converter: { sub_converters } } }),
        sampler,
        'speed',
      )
    expect(at(32).rule!.required).toBeCloseTo((8 * 28e9) / 32, 0)
    expect(at(64).derived!.required! / at(32).derived!.required!).toBeCloseTo(0.5, 12)
  })

  it('law: metastability is judged for edge samplers only, against its share of the error target', () => {
    const asked = (over: Overrides) =>
      sampler.checks.find(({ name }) => name === 'metastability')!.asked!(caseOf(28, over))
    expect(asked({})).toBe(false)
    expect(asked(edges())).toBe(true)
    const found = outcomeOf(caseOf(28, edges()), sampler, 'metastability')
    expect(found.required).toBeCloseTo(1e-7, 15)
    expect(found.margin).toBeCloseTo(Math.log(found.available!) / Math.log(1e-7), 12)
    expect(margin({ ...edges(), data_rate: 80e9 }, 'metastability')).toBeLessThan(
      margin(edges(), 'metastability'),
    )
    expect(margin({ ...edges(), error_ratio: 1e-9 }, 'metastability')).toBeLessThan(
      margin(edges(), 'metastability'),
    )
  })

  it('is unknown about metastability without an error target', () => {
    const found = outcomeOf(caseOf(28, { ...edges(), error_ratio: null }), sampler, 'metastability')
    expect([found.margin, found.required, found.available]).toEqual([null, null, null])
    expect(found.reason).toMatch(/error_ratio/)
  })
})

describe('the flip-flop', () => {
  it('law: higher rate lowers the margin, peaking raises it, headroom fails below 1 without an operating point', () => {
    expect(margin({ ...flipFlop(), data_rate: 112e9 })).toBeLessThan(margin(flipFlop()))
    expect(margin({ ...flipFlop(), peaking: { receive: 'shunt-flat' } })).toBeGreaterThan(margin(flipFlop()))
    for (const name of ['speed', 'headroom', 'metastability']) {
      const over = { ...flipFlop({ edge_samplers: 'yes' }), supply: { voltage: 0.4 } }
      const found = outcomeOf(caseOf(28, over), sampler, name)
      expect(found.margin).toBeLessThan(1)
      expect(found.margin).toBeGreaterThanOrEqual(0)
    }
  })

  it('law: it needs the speed of a divider at 1.2 times its clock', () => {
    const found = outcomeOf(caseOf(16, flipFlop()), sampler, 'speed').derived!
    const oscillator = { kind: 'LC', range: [15e9, 1.2 * 14e9] }
    const divides = outcomeOf(caseOf(16, { oscillator, divider: { fan_out: 1 } }), divider, 'speed').derived!
    expect(found.required! / divides.required!).toBeCloseTo(1, 12)
    expect(found.available).toBe(divides.available)
  })
})

describe('derivations of the sampler', () => {
  it.each([
    ['passing', 16, edges()],
    ['failing', 180, edges()],
    ['below threshold', 28, { supply: { core_voltage: 0.4 }, ...edges() }],
    ['converter', 16, { receiver: { kind: 'converter' } }],
  ] as const)('dynamic latch, evaluates with mathjs: %s', (_, nm, settings) => {
    expect(walkAll(caseOf(nm, settings), sampler)).toBeGreaterThan(100)
  })

  it.each([
    ['passing', 16, {}],
    ['failing', 180, {}],
    ['lifted supply', 28, { supply: { voltage: 1.2 } }],
    ['no operating point', 28, { supply: { voltage: 0.4 } }],
  ] as const)('flip-flop, evaluates with mathjs: %s', (_, nm, settings) => {
    const given = caseOf(nm, { ...flipFlop({ edge_samplers: 'yes' }), ...settings })
    expect(walkAll(given, sampler)).toBeGreaterThan(100)
  })
})
