import { describe, expect, it } from 'vitest'
import { benchAt } from '../../src/blocks/bench.ts'
import { divider } from '../../src/blocks/divider.ts'
import {
  crossDensity,
  crossGain,
  latchDemand,
  latchFactorOf,
  latchLoad,
  latchLoadAt,
} from '../../src/blocks/latch-load.ts'
import { PLAIN } from '../../src/derivation/trace.ts'
import { typicalPoint } from '../../src/device/conditions.ts'
import { caseOf, nodeOf, type Overrides, outcomeOf, resultsOf, walkAll, worstMargin } from './bench.ts'

const over = (top: number, more: Overrides = {}): Overrides => ({
  oscillator: { kind: 'LC', range: [0.9 * top, top] },
  ...more,
})

describe('the latch of a static divider', () => {
  it('independent: load summed element by element, about 4.5 without output load (method, section 3)', () => {
    const [C_gg, C_gd, C_dd, C_lay, C_w, A, ratio] = [1, 0.28, 0.6, 0.6, 0.35, 1.4, 0.55]
    const next = C_gg + A * C_gd + C_lay
    const cross = ratio * (C_gg + 3 * C_gd + C_dd + C_lay)
    const load = latchLoad.run(A, C_gd, C_lay, ratio, C_dd, C_w, 0)
    expect(load).toBeCloseTo(next + cross + C_dd + C_w, 12)
    expect(Math.abs(load / 4.5 - 1)).toBeLessThan(0.05)
    expect(latchLoad.run(A, C_gd, C_lay, ratio, C_dd, C_w, 1) - load).toBeCloseTo(next, 12)
  })

  it('law: the toggle rate factor is 2x r_t = 1.32 and scales the demand', () => {
    expect(latchFactorOf(PLAIN)).toBeCloseTo(1.32, 12)
    expect(latchDemand.run(15e9, 4.5, 1.32, 1)).toBeCloseTo((15e9 * 4.5) / 1.32, 0)
  })

  // values.json A14: g_m 10 mS, R 200 Ω, I 2 mA: gain 2 on a swing of 0.4 V (Razavi 2003).
  it('published: loop gain is g_m R with R = swing over current', () => {
    expect(crossGain.run(1, 0.01, 0.4, 0.002)).toBeCloseTo(2, 4)
  })
})

describe('regeneration', () => {
  it('independent: half the tail current through the narrower cross device', () => {
    const [W, J, ratio] = [10e-6, 200, 0.55]
    expect(crossDensity.run(J, ratio)).toBeCloseTo((J * W) / 2 / (ratio * W), 9)
  })
})

describe('checks of the divider', () => {
  const margin = (nm: 180 | 90 | 28 | 16, top: number, more: Overrides = {}, name = 'speed') =>
    worstMargin(caseOf(nm, over(top, more)), divider, name)

  it('law: higher rate or more output load lowers the margin, peaking raises it', () => {
    expect(margin(16, 16e9)).toBeLessThan(margin(16, 12e9))
    expect(margin(16, 12e9, { divider: { fan_out: 2 } })).toBeLessThan(margin(16, 12e9))
    expect(margin(16, 12e9, { peaking: { clock: 'shunt-flat' } })).toBeGreaterThan(margin(16, 12e9))
  })

  it('law: less overlap capacitance never lowers the margin', () => {
    const node = nodeOf(28)
    const light = { ...node, nmos: { ...node.nmos, C_ext: 0.5 * node.nmos.C_ext } }
    expect(worstMargin(caseOf(light, over(12e9)), divider, 'speed')).toBeGreaterThan(margin(28, 12e9))
  })

  it('law: a faster clock leaves the cross pair no more loop gain', () => {
    const gains = [8e9, 12e9, 16e9, 24e9].map((top) => margin(16, top, {}, 'regeneration'))
    gains.slice(1).forEach((gain, k) => {
      expect(gain).toBeLessThanOrEqual(gains[k]! * (1 + 1e-9))
    })
  })

  // limits.json L02 and L05: no published static divider above 20 GHz at 180 nm, 44 GHz at 90 nm.
  it('published: what nobody has built is no clear pass, even with the widest peaking', () => {
    const best: Overrides = {
      peaking: { clock: 'shunt-bridged' },
      divider: { fan_out: 0 },
    }
    for (const [nm, top] of [
      [180, 20e9],
      [90, 44e9],
    ] as const) {
      expect(outcomeOf(caseOf(nm, over(top, best)), divider, 'speed').margin).toBeLessThan(1)
    }
  })

  it('is unknown for kinds without a model, and asks them nothing else', () => {
    for (const kind of ['injection-locked', 'regenerative']) {
      const given = caseOf(16, over(14e9, { divider: { kind } }))
      const found = outcomeOf(given, divider, 'speed')
      expect([found.margin, found.required, found.available]).toEqual([null, null, null])
      expect(found.reason).toMatch(/no model/)
      expect(divider.checks.filter(({ asked }) => asked === undefined || asked(given))).toHaveLength(1)
    }
  })

  it('is not asked without an oscillator or without a divider', () => {
    expect(divider.asked(caseOf(16)).yes).toBe(false)
    expect(divider.asked(caseOf(16, over(14e9, { divider: { kind: 'none' } }))).yes).toBe(false)
    expect(divider.asked(caseOf(16, over(14e9), 'clock')).yes).toBe(true)
  })

  it('fails below 1, never unknown, without an operating point', () => {
    const given = caseOf(28, over(14e9, { supply: { voltage: 0.4 } }))
    for (const name of ['speed', 'headroom', 'regeneration']) {
      const found = outcomeOf(given, divider, name)
      expect(found.margin).toBeLessThan(1)
      expect(found.margin).toBeGreaterThan(0)
    }
  })

  it('judges device stress only on a lifted supply', () => {
    const asked = (given: ReturnType<typeof caseOf>) =>
      divider.checks.find(({ name }) => name === 'stress')!.asked!(given)
    expect(asked(caseOf(28, over(14e9)))).toBe(false)
    const lifted = caseOf(28, over(14e9, { supply: { voltage: 1.2 } }))
    expect(asked(lifted)).toBe(true)
    const found = outcomeOf(lifted, divider, 'stress')
    expect(found.required).toBeCloseTo(1.1 * 0.95, 12)
    // The clock pair keeps three thermal voltages above the tail.
    expect(found.available).toBeCloseTo(1.2 - 0.12 - (3 * 1.380649e-23 * 300.15) / 1.602176634e-19, 12)
  })

  it('law: at the reported design point the device is 1 + guard times as fast as its own load demands', () => {
    const given = caseOf(16, over(12e9))
    const found = resultsOf(given, divider)
    const value = (name: string): number => found[`device.divider.${name}`]!.value!
    const { nmos } = benchAt(given, typicalPoint(300.15), PLAIN)
    const load = latchLoadAt(nmos, given.node.shares, 1.4, 0, value('J_A_per_m'), PLAIN)
    expect(value('fT_Hz') / latchDemand.run(12e9, load, 1.32, 1)).toBeCloseTo(1.15, 8)
  })

  it.each([
    ['passing', 16, over(12e9)],
    ['failing', 180, over(12e9, { peaking: { clock: 'shunt-flat' } })],
    ['with a tail', 65, over(8e9)],
    ['lifted supply', 28, over(14e9, { supply: { voltage: 1.2 } })],
    ['no operating point', 28, over(14e9, { supply: { voltage: 0.4 } })],
  ] as const)('evaluates with mathjs: %s', (_, nm, settings) => {
    expect(walkAll(caseOf(nm, settings), divider)).toBeGreaterThan(100)
  })
})
