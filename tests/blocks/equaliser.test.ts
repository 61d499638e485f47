import { describe, expect, it } from 'vitest'
import { equaliser, neededSelfGain } from '../../src/blocks/equaliser.ts'
import {
  chainDemand,
  degeneration,
  linearShare,
  lowFrequencyGain,
  peakGain,
} from '../../src/blocks/linear-chain.ts'
import { PLAIN } from '../../src/derivation/trace.ts'
import { caseOf, nodeOf, type Overrides, outcomeOf, resultsOf, walkAll, worstMargin } from './bench.ts'

const margin = (over: Overrides = {}, name = 'speed', nm: 65 | 28 | 16 = 16) =>
  worstMargin(caseOf(nm, over), equaliser, name)
const inverter = (more: Overrides = {}): Overrides => ({ receiver: { equaliser: 'complementary', ...more } })

describe('the degenerated pair', () => {
  // values.json A15: g_m 10 mS, R_D 200 Ω, R_S 400 Ω (Gondi & Razavi, IEEE JSSC 42(9), 2007), tolerance 1e-4.
  it('published: gain at low frequency and boost as A15 states', () => {
    const g_mR_S_2 = (0.01 * 400) / 2
    expect(Math.abs(lowFrequencyGain.run(0.01 * 200, g_mR_S_2) / 0.666667 - 1)).toBeLessThan(1e-4)
    expect(degeneration.run(9.54243, 1)).toBeCloseTo(g_mR_S_2, 4)
    expect(peakGain.run(6.0206)).toBeCloseTo(2, 4)
  })

  it('law: stages that share a boost multiply up to it', () => {
    for (const n of [1, 2, 3, 4]) expect((1 + degeneration.run(14, n)) ** n).toBeCloseTo(10 ** (14 / 20), 12)
    expect(linearShare(0.99, PLAIN)).toBe(0.4)
    expect(linearShare(1, PLAIN)).toBe(0.6)
  })

  it('independent: a cascade of two poles of the demanded stages is 3 dB down at the bandwidth asked', () => {
    const [BW, A, l, shrink] = [16.8e9, 1.41, 2.8, Math.sqrt(Math.SQRT2 - 1)]
    const f_p = chainDemand.run(BW, A, l, 1, shrink) / (A * l)
    expect(1 / (1 + (BW / f_p) ** 2)).toBeCloseTo(Math.SQRT1_2, 12)
  })

  it('law: with twice the gain as self-gain, the output conductance takes a third of the gain', () => {
    const [A, g_m] = [1.41, 0.01]
    const [R, r_o] = [A / g_m, neededSelfGain.run(A) / g_m]
    expect(g_m / (1 / R + 1 / r_o) / A).toBeCloseTo(2 / 3, 12)
  })
})

describe('the current-mode chain', () => {
  // At the typical point: at its slow and cold corner this node is bound by its input, where gain eases the peak.
  it('law: rate, gain, stages, load and bandwidth lower the margin; peaking raises it', () => {
    const typical = (over: Overrides = {}) => outcomeOf(caseOf(16, over), equaliser, 'speed').margin!
    expect(typical({ data_rate: 112e9 })).toBeLessThan(typical())
    for (const receiver of [{ peak_gain: 6 }, { stages: 3 }, { fan_out: 2 }, { bandwidth_factor: 1.5 }]) {
      expect(typical({ receiver })).toBeLessThan(typical())
    }
    expect(typical({ peaking: { receive: 'shunt-flat' } })).toBeGreaterThan(typical())
    const node = nodeOf(16)
    const light = { ...node, nmos: { ...node.nmos, C_ext: 0.5 * node.nmos.C_ext } }
    expect(outcomeOf(caseOf(light), equaliser, 'speed').margin).toBeGreaterThan(typical())
  })

  it('law: what boost flattens is larger at the input, so more boost costs headroom', () => {
    const at = (boost: number) =>
      margin({ receiver: { linear_swing: 0.4, stages: 1, ctle: { boost } } }, 'headroom', 28)
    const plain = margin({ receiver: { linear_swing: 0.4, stages: 1 } }, 'headroom', 28)
    expect(at(3)).toBeLessThan(plain)
    expect(at(5)).toBeLessThan(at(3))
    // From 6 dB a stage is degenerated enough to be linear over more of its swing, which gives some of it back.
    expect(at(6.1)).toBeGreaterThan(at(5.9))
  })

  it('law: boost is judged only when stated, and each stage adds its 12 dB', () => {
    const asked = (over: Overrides) =>
      equaliser.checks.find(({ name }) => name === 'boost')!.asked!(caseOf(16, over))
    expect(asked({})).toBe(false)
    expect(asked({ receiver: { ctle: { boost: 8 } } })).toBe(true)
    const at = (stages: number) =>
      outcomeOf(caseOf(16, { receiver: { stages, ctle: { boost: 12 } } }), equaliser, 'boost')
    expect(at(1).margin).toBeCloseTo(1, 12)
    expect(at(2).margin).toBeCloseTo(10 ** (12 / 20), 12)
  })

  it('law: gain at low frequency is the peak gain over the share of the boost', () => {
    const found = resultsOf(caseOf(16, { receiver: { stages: 2, ctle: { boost: 8 } } }), equaliser)
    expect(found['equaliser.gain_low_frequency']!.value).toBeCloseTo(10 ** ((3 - 4) / 20), 12)
  })

  it('fails below 1, never unknown, without an operating point', () => {
    for (const name of ['speed', 'headroom', 'self_gain']) {
      const found = outcomeOf(caseOf(28, { supply: { voltage: 0.4 } }), equaliser, name)
      expect(found.margin).toBeLessThan(1)
      expect(found.margin).toBeGreaterThan(0)
    }
  })
})

describe('the complementary chain', () => {
  it('law: more core supply raises speed and headroom, more rate lowers them', () => {
    for (const name of ['speed', 'headroom']) {
      const at = (core_voltage: number) => margin({ ...inverter(), supply: { core_voltage } }, name)
      expect(at(0.9)).toBeGreaterThan(at(0.8))
      expect(margin({ ...inverter(), data_rate: 80e9 }, name)).toBeLessThan(margin(inverter(), name))
    }
  })

  it('law: at the supply that headroom asks for, speed is exactly reached', () => {
    const given = (core_voltage: number) =>
      caseOf(16, { ...inverter(), demand: { route: 'derived' }, supply: { core_voltage } })
    const needed = outcomeOf(given(0.8), equaliser, 'headroom').required!
    expect(outcomeOf(given(needed), equaliser, 'speed').margin).toBeCloseTo(1, 6)
  })

  it('law: a large swing binds instead of speed', () => {
    const slow = { ...inverter({ linear_swing: 1 }), data_rate: 10e9 }
    const found = outcomeOf(caseOf(16, slow), equaliser, 'headroom')
    expect(found.basis).toMatch(/swing/)
    expect(found.required).toBeGreaterThan(0.5 + 2 * 0.1)
  })

  it('says so when no supply gives the speed', () => {
    const found = outcomeOf(caseOf(180, { ...inverter(), data_rate: 112e9 }), equaliser, 'headroom')
    expect(found.reason).toMatch(/out of reach/)
    expect(found.margin).toBeLessThan(1)
  })
})

describe('derivations of the equaliser', () => {
  it.each([
    ['passing', 16, {}],
    ['with boost', 28, { receiver: { ctle: { boost: 13 } } }],
    ['failing', 180, {}],
    ['lifted supply', 28, { supply: { voltage: 1.2 } }],
    ['no operating point', 28, { supply: { voltage: 0.4 } }],
    ['complementary', 16, inverter({ ctle: { boost: 6 } })],
    ['complementary, failing', 180, { ...inverter(), data_rate: 112e9 }],
  ] as const)('evaluates with mathjs: %s', (_, nm, settings) => {
    expect(walkAll(caseOf(nm, settings as Overrides), equaliser)).toBeGreaterThan(100)
  })
})
