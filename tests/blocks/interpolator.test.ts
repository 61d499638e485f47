import { describe, expect, it } from 'vitest'
import { interpolator, interpolatorDemand } from '../../src/blocks/interpolator.ts'
import { legsLoad, loadFactor } from '../../src/blocks/load.ts'
import { caseOf, nodeOf, type Overrides, outcomeOf, resultsOf, walkAll, worstMargin } from './bench.ts'

const margin = (over: Overrides = {}, name = 'speed') => worstMargin(caseOf(16, over), interpolator, name)

describe('the phase interpolator', () => {
  it('law: with one leg its load is that of a plain current-mode stage; each further leg adds a drain', () => {
    const plain = loadFactor.run(1, 1.4, 0.28, 0.6, 0.6, 0.35)
    expect(legsLoad.run(1, 1.4, 0.28, 0.6, 1, 0.6, 0.35)).toBeCloseTo(plain, 12)
    expect(legsLoad.run(1, 1.4, 0.28, 0.6, 4, 0.6, 0.35)).toBeCloseTo(plain + 3 * 0.6, 12)
  })

  it('independent: at the demanded speed the pole of A = g_m R, 1/(2πRC) lies at the clock frequency', () => {
    const [f_ck, A, l, C_gg] = [14e9, 1.4, 4.7, 1e-15]
    const g_m = 2 * Math.PI * interpolatorDemand.run(f_ck, A, l, 1) * C_gg
    expect(1 / (2 * Math.PI * (A / g_m) * l * C_gg) / f_ck).toBeCloseTo(1, 12)
  })

  it('law: a higher rate lowers the margin, full rate lowers it further, peaking raises it', () => {
    expect(margin({ data_rate: 112e9 })).toBeLessThan(margin())
    expect(margin({ clocking: 'full-rate' })).toBeLessThan(margin())
    expect(margin({ peaking: { clock: 'shunt-flat' } })).toBeGreaterThan(margin())
  })

  it('law: less overlap capacitance never lowers the margin', () => {
    const node = nodeOf(16)
    const light = { ...node, nmos: { ...node.nmos, C_ext: 0.5 * node.nmos.C_ext } }
    expect(worstMargin(caseOf(light), interpolator, 'speed')).toBeGreaterThan(margin())
  })

  it('is asked of links whose receiver interpolates', () => {
    expect(interpolator.of).toEqual(['link'])
    expect(interpolator.asked(caseOf(16)).yes).toBe(true)
    expect(interpolator.asked(caseOf(16, { receiver: { interpolator: 'no' } })).yes).toBe(false)
  })

  it('fails below 1, never unknown, without an operating point', () => {
    const found = outcomeOf(caseOf(16, { supply: { voltage: 0.35 } }), interpolator, 'speed')
    expect(found.margin).toBeLessThan(1)
    expect(found.margin).toBeGreaterThan(0)
  })

  it('reports its device', () => {
    expect(resultsOf(caseOf(16), interpolator)['device.interpolator.J_A_per_m']!.value).toBeGreaterThan(0)
  })

  it.each([
    ['passing', 16, {}],
    ['failing', 180, {}],
    ['no operating point', 16, { supply: { voltage: 0.35 } }],
  ] as const)('evaluates with mathjs: %s', (_, nm, over) => {
    expect(walkAll(caseOf(nm, over), interpolator)).toBeGreaterThan(100)
  })
})
