import { describe, expect, it } from 'vitest'
import { benchAt } from '../../src/blocks/bench.ts'
import { amplitudeOfCurrent, complementaryAmplitudeOfCurrent } from '../../src/blocks/lc-amplitude.ts'
import { lcOscillator } from '../../src/blocks/lc-oscillator.ts'
import {
  fixedShareOfTank,
  loopGainOfCurrent,
  loopGainOfShare,
  oscillatorDemand,
  pairCapacitance,
  pairWeight,
  startUpTransconductance,
} from '../../src/blocks/lc-start-up.ts'
import {
  bankRatio,
  largestFixedShare,
  neededRatio,
  qualityAtLowEnd,
  reachableRatio,
  switchSpeed,
  tankCapacitance,
  tankInductance,
  tankResistance,
  tuningRange,
} from '../../src/blocks/lc-tank.ts'
import { PLAIN } from '../../src/derivation/trace.ts'
import { typicalPoint } from '../../src/device/conditions.ts'
import { speedAt } from '../../src/device/speed.ts'
import {
  caseOf,
  nodeOf,
  type Overrides,
  outcomeOf,
  resultsOf,
  walkAll,
  walked,
  worstMargin,
} from './bench.ts'

const lc = (over: Overrides = {}): Overrides => ({ oscillator: { kind: 'LC', range: [13e9, 15e9], ...over } })

describe('the tank', () => {
  // values.json A05: f = 1/(2π√(LC)); recomputed with SciPy 1.17.1; tolerance 1e-4.
  it.each([
    [1.2, 1.09545, 9.10977],
    [1.5, 1.22474, 20.2041],
    // biome-ignore lint/suspicious/noApproximativeNumericConstant: as printed in the source
    [2, 1.41421, 34.3146],
    [3, 1.73205, 53.5898],
    [4, 2, 66.6667],
  ])('independent: capacitance ratio %f for frequency ratio %f, tuning range %f %%', (ratio, x, percent) => {
    expect(neededRatio.run(x, 0) / ratio).toBeCloseTo(1, 4)
    expect((100 * tuningRange.run(x)) / percent).toBeCloseTo(1, 4)
  })

  it('independent: a tuning range of 20 % needs a capacitance ratio of 1.49383 (A05)', () => {
    const x = 1.1 / 0.9
    expect(tuningRange.run(x)).toBeCloseTo(0.2, 12)
    expect(neededRatio.run(x, 0)).toBeCloseTo(1.49383, 5)
  })

  // values.json A06: L 100 pH, C 1 pF, Q 15 give f0 15.9155 GHz and R_p 150 Ω; tolerance 1e-4.
  it('independent: inductance, capacitance and resistance of A06', () => {
    const f0 = 15915500000
    expect(tankInductance.run(10, f0) / 1e-10).toBeCloseTo(1, 4)
    expect(tankCapacitance.run(f0, 1e-10) / 1e-12).toBeCloseTo(1, 4)
    expect(tankResistance.run(15, f0, 1e-10) / 150).toBeCloseTo(1, 4)
  })

  it('independent: the bank ratio follows from the admittance of two capacitors and a switch', () => {
    const [R, C_off, f, Q] = [20, 10e-15, 15e9, 20]
    const w = 2 * Math.PI * f
    const C = 2 / (w * R * Q) // on: C/2 in series with R has this quality factor
    const off = (C * C_off) / (C + C_off) / 2 // off: each side ends on C_off
    const f_sw = 1 / (2 * Math.PI * R * C_off)
    expect(bankRatio.run(f_sw, Q, f) / (C / 2 / off)).toBeCloseTo(1, 12)
  })

  it('law: f_T over twice the switch frequency comes out near 0.12 to 0.17 (method, section 3)', () => {
    for (const nm of [180, 65, 28, 16] as const) {
      const given = caseOf(nm, lc())
      const f_T = outcomeOf(given, lcOscillator, 'speed').derived!.available!
      const ratio = f_T / (2 * switchSpeed(benchAt(given, typicalPoint(300), PLAIN)))
      expect(ratio).toBeGreaterThan(0.11)
      expect(ratio).toBeLessThan(0.2)
    }
  })
})

describe('start-up and the room for the pair', () => {
  const [S, x, Q_L, Q_b, f_max, s_0, rho, X_L] = [2.5, 15 / 13, 18, 20, 15e9, 0.2, 4, 10]
  const K = neededRatio.run(x, 0.05)
  const kappa = pairCapacitance.run(0.28, 0.6)
  const f_lo = f_max / x
  const L_d = tankInductance.run(X_L, f_max)
  const C_t = tankCapacitance.run(f_max, L_d)
  const s_f = largestFixedShare.run(rho, K)
  const Q_lo = qualityAtLowEnd.run(x, Q_L, Q_b, s_f)
  const g_m = startUpTransconductance.run(S, Q_lo, f_lo, L_d)
  const f_T = oscillatorDemand.run(kappa, g_m, s_f - s_0, C_t)

  it('law: the demand is the closed form s_dev = (2Sκ/Q_t)(f_max/f_T)(f_max/f_min)', () => {
    expect(((2 * S * kappa) / Q_lo) * (f_max / f_T) * x).toBeCloseTo(s_f - s_0, 12)
  })

  it('law: a pair of exactly the demanded speed reaches exactly the needed capacitance ratio', () => {
    const share = fixedShareOfTank.run(s_0, pairWeight.run(S, kappa, f_max, f_T, x), x, Q_L, Q_b)
    expect(share).toBeCloseTo(s_f, 12)
    expect(reachableRatio.run(share, rho)).toBeCloseTo(K, 12)
    expect(loopGainOfShare.run(s_f - s_0, C_t, f_T, Q_lo, f_lo, L_d, kappa)).toBeCloseTo(S, 12)
  })

  it('independent: the capacitance of the pair by nodal analysis, both sides driven by ±1/2 V', () => {
    const [C_gd, C_db, C_gs] = [0.28, 0.6 - 0.28, 1 - 0.28]
    const [V_a, V_b] = [0.5, -0.5]
    // Gate of one device and drain of the other meet at a; both gate–drain capacitances lie between a and b.
    const charge_a = (C_gs + C_db) * V_a + 2 * C_gd * (V_a - V_b)
    expect(kappa).toBeCloseTo(charge_a / (V_a - V_b), 12)
  })

  it('law: the reach falls without a step, and below 1 when what is fixed overloads the tank', () => {
    expect(reachableRatio.run(0, rho)).toBe(rho)
    expect(reachableRatio.run(1 - 1e-12, rho)).toBeCloseTo(reachableRatio.run(1, rho), 9)
    expect(reachableRatio.run(2, rho)).toBe(0.5)
  })

  it('independent: loop gain of a stated current is g_m R_p/2, each side carrying half of it', () => {
    const [gm_ID, I] = [15, 4e-3]
    const R_p = tankResistance.run(Q_lo, f_lo, L_d)
    expect(loopGainOfCurrent.run(gm_ID, I, Q_lo, f_lo, L_d)).toBeCloseTo((gm_ID * (I / 2) * R_p) / 2, 12)
  })

  it('independent: the start-up conductance cancels the tank S times over', () => {
    const R_p = tankResistance.run(Q_lo, f_lo, L_d)
    expect((g_m / 2) * R_p).toBeCloseTo(S, 12)
  })

  it('law: a complementary pair makes the same amplitude with half the current', () => {
    expect(complementaryAmplitudeOfCurrent.run(1e-3, 150, 9)).toBeCloseTo(
      amplitudeOfCurrent.run(2e-3, 150, 9),
      15,
    )
  })
})

describe('checks of the LC oscillator', () => {
  const at = (nm: 180 | 65 | 28 | 16, over: Overrides = {}) => caseOf(nm, lc(over))
  const of = (given: ReturnType<typeof caseOf>, name: string) => worstMargin(given, lcOscillator, name)

  it('law: a higher frequency at the same ratio never raises a margin', () => {
    for (const name of ['speed', 'tuning', 'headroom']) {
      const margins = [5e9, 10e9, 15e9, 20e9, 25e9].map((f) => of(at(28, { range: [0.87 * f, f] }), name))
      margins.slice(1).forEach((margin, k) => {
        expect(margin).toBeLessThanOrEqual(margins[k]! * (1 + 1e-9))
      })
    }
  })

  it('law: a wider range, a larger load or a stricter start-up lowers the tuning margin; cores raise it', () => {
    const base = of(at(28), 'tuning')
    expect(of(at(28, { range: [11e9, 15e9] }), 'tuning')).toBeLessThan(base)
    expect(of(at(28, { load_share: 0.3 }), 'tuning')).toBeLessThan(base)
    expect(of(at(28, { startup_gain: 4 }), 'tuning')).toBeLessThan(base)
    expect(of(at(28, { cores: 2 }), 'tuning')).toBeGreaterThan(base)
  })

  it('law: a faster device never lowers the speed margin of the derived route', () => {
    const node = nodeOf(28)
    const faster = { ...node, nmos: { ...node.nmos, C_ext: node.nmos.C_ext * 0.5 } }
    const over = lc({ range: [24e9, 28e9] })
    const slow = outcomeOf(caseOf(node, over), lcOscillator, 'speed').derived!.margin!
    expect(outcomeOf(caseOf(faster, over), lcOscillator, 'speed').derived!.margin!).toBeGreaterThan(slow)
  })

  it('law: the tuning margin and the derived speed margin cross 1 together', () => {
    const margins = (f: number): readonly [number, number] => {
      const given = at(65, { range: [0.87 * f, f] })
      return [
        outcomeOf(given, lcOscillator, 'tuning').margin!,
        outcomeOf(given, lcOscillator, 'speed').derived!.margin!,
      ]
    }
    let [low, high] = [10e9, 60e9]
    for (let k = 0; k < 60; k++) {
      const middle = (low + high) / 2
      if (margins(middle)[0] >= 1) low = middle
      else high = middle
    }
    expect(margins(low)[1]).toBeCloseTo(1, 6)
  })

  it('fails with the limiting term and a smooth margin when no speed suffices', () => {
    const margin = (f: number): number => {
      const found = outcomeOf(at(28, { range: [f, 15e9], bank_q: 60 }), lcOscillator, 'speed')
      expect(found.derived!.required).toBeNull()
      expect(found.derived!.reason).toMatch(/no device speed suffices/)
      return found.derived!.margin!
    }
    const [a, b, c] = [margin(9e9), margin(9.01e9), margin(9.02e9)]
    expect(c).toBeLessThan(1)
    expect(a).toBeLessThan(b)
    expect((c - b) / (b - a)).toBeCloseTo(1, 1)
  })

  it('says which ranges no published tank covers', () => {
    expect(outcomeOf(at(28, { range: [9e9, 15e9] }), lcOscillator, 'tuning').reason).toMatch(/two cores/)
    expect(outcomeOf(at(28, { range: [9e9, 15e9], cores: 2 }), lcOscillator, 'tuning').reason).toBeUndefined()
    expect(outcomeOf(at(28, { range: [3.4e9, 5e9] }), lcOscillator, 'tuning').reason).toBeUndefined()
    expect(outcomeOf(at(28, { range: [20e9, 29e9] }), lcOscillator, 'tuning').reason).toMatch(/25 %/)
  })

  it('law: the loop gain of a stated current is proportional to it', () => {
    const gain = (current: number) => outcomeOf(at(28, { current }), lcOscillator, 'start_up').available!
    expect(gain(4e-3) / gain(1e-3)).toBeCloseTo(4, 9)
  })

  it('judges a stated amplitude by supply and device limits', () => {
    const given = at(28, { amplitude: 0.8 })
    const found = outcomeOf(given, lcOscillator, 'amplitude')
    expect(found.required).toBeCloseTo(2 * (0.95 - 0.12), 12)
    expect(found.margin).toBeCloseTo((2 * 0.83) / 0.8, 12)
    const peak = outcomeOf(given, lcOscillator, 'peak_voltage')
    expect(peak.available).toBeCloseTo(0.95 + 0.4, 12)
    const both = at(28, { amplitude: 0.8, pair: 'complementary' })
    expect(outcomeOf(both, lcOscillator, 'amplitude').required).toBeCloseTo(0.83, 12)
    expect(outcomeOf(both, lcOscillator, 'peak_voltage').available).toBeCloseTo(0.475 + 0.4, 12)
  })

  it('asks for amplitude and range only where the scenario does', () => {
    const asked = (given: ReturnType<typeof caseOf>) =>
      lcOscillator.checks
        .filter((check) => check.asked === undefined || check.asked(given))
        .map(({ name }) => name)
    expect(asked(at(28))).toEqual(['speed', 'headroom', 'tuning', 'start_up', 'peak_voltage', 'range'])
    expect(asked(at(28, { amplitude: 0.4 }))).toContain('amplitude')
    expect(asked(caseOf(28, lc(), 'clock'))).not.toContain('range')
    expect(lcOscillator.asked(caseOf(28))).toEqual({
      yes: false,
      because: 'the scenario states no oscillator',
    })
  })

  it("holds the lane's clock inside the stated range, or twice it when phases are divided down", () => {
    const range = (over: Overrides) => outcomeOf(caseOf(28, over), lcOscillator, 'range').margin
    expect(range(lc())).toBeCloseTo(1.15, 12)
    expect(range(lc({ range: [14e9, 15e9] }))).toBeCloseTo(1.15, 12)
    expect(range(lc({ range: [14.1e9, 15e9] }))).toBe(0)
    expect(range({ ...lc(), clock: { phases_from: 'divide-by-2' } })).toBe(0)
    expect(range({ ...lc({ range: [27e9, 29e9] }), clock: { phases_from: 'divide-by-2' } })).toBeCloseTo(1.15)
  })

  it('is unknown, with its reason, for a complementary pair of thick-oxide devices', () => {
    const node = { ...nodeOf(28), thick: nodeOf(180).nmos }
    const given = caseOf(node, { ...lc({ pair: 'complementary' }), supply: { use: 'io' } })
    const found = outcomeOf(given, lcOscillator, 'speed')
    expect(found.margin).toBeNull()
    expect(found.reason).toMatch(/thick-oxide pMOS/)
  })

  it('fails below 1, never unknown, when the supply is too low for any operating point', () => {
    const given = caseOf(28, { ...lc({ current: 4e-3 }), supply: { voltage: 0.3 } })
    for (const name of ['speed', 'headroom', 'tuning', 'start_up', 'peak_voltage']) {
      const found = outcomeOf(given, lcOscillator, name)
      expect(found.margin).toBeGreaterThan(0)
      expect(found.margin).toBeLessThan(1)
    }
    expect(outcomeOf(given, lcOscillator, 'tuning').reason).toMatch(/mV short/)
  })
})

describe('results of the LC oscillator', () => {
  it('law: the current holds the planned amplitude at the low end: I = πV0/(2R_p)', () => {
    const found = resultsOf(caseOf(28, lc()), lcOscillator)
    const value = (name: string): number => found[`lc_oscillator.${name}`]!.value!
    const R_lo = value('tank.Q_low_end') * 10 * (13 / 15)
    expect(value('amplitude_V')).toBeCloseTo(0.8 * 2 * 0.83, 9)
    expect(value('current_A')).toBeCloseTo((Math.PI * value('amplitude_V')) / (2 * R_lo), 9)
    expect(value('tank.resistance_ohm')).toBeCloseTo(value('tank.Q_high_end') * 10, 9)
  })

  it('independent: the pair of the stated width weighs its stated share on the tank', () => {
    const given = caseOf(65, lc({ range: [26e9, 30e9] }))
    const found = resultsOf(given, lcOscillator)
    const value = (name: string): number => found[name]!.value!
    const { nmos } = benchAt(given, typicalPoint(300.15), PLAIN)
    const C_eff = speedAt(nmos, value('device.lc_oscillator.J_A_per_m'), PLAIN).C_gg + nmos.of.C_lay
    const weight = 1.08 * C_eff * value('lc_oscillator.width_m')
    const share = weight / value('lc_oscillator.tank.capacitance_F')
    expect(share / value('lc_oscillator.tank.device_share')).toBeCloseTo(1, 9)
  })

  it('are null with a reason without an operating point', () => {
    const found = resultsOf(caseOf(28, { ...lc(), supply: { voltage: 0.3 } }), lcOscillator)
    expect(found['lc_oscillator.current_A']).toMatchObject({ value: null, reason: 'no operating point' })
    expect(found['device.lc_oscillator.fT_Hz']!.value).toBeNull()
  })
})

describe('derivations of the LC oscillator', () => {
  it.each([
    ['passing', 28, {}],
    ['failing', 180, { range: [26e9, 30e9] }],
    ['without tail, Q stated, current stated', 65, { tail: 'no', tank_q: 12, current: 3e-3 }],
    ['complementary, amplitude stated, two cores', 16, { pair: 'complementary', amplitude: 0.4, cores: 2 }],
    ['complementary, current stated', 16, { pair: 'complementary', current: 4e-3 }],
  ] as const)('evaluate with mathjs: %s', (_, nm, over) => {
    expect(walkAll(caseOf(nm, lc(over)), lcOscillator)).toBeGreaterThan(300)
  })

  it('evaluate with mathjs: no operating point', () => {
    expect(
      walkAll(caseOf(28, { ...lc({ current: 4e-3 }), supply: { voltage: 0.3 } }), lcOscillator),
    ).toBeGreaterThan(100)
  })

  it('show the start-up transconductance', () => {
    const steps = walked(caseOf(65, lc()), lcOscillator, 'start_up', typicalPoint(300.15))
    expect(steps.at(-1)!.yields).toBe('margin')
    const speed = walked(
      caseOf(65, { ...lc(), demand: { route: 'derived' } }),
      lcOscillator,
      'speed',
      typicalPoint(300.15),
    )
    expect(speed.map(({ symbol }) => symbol)).toContain('g_m_start')
  })
})
