import { describe, expect, it } from 'vitest'
import { legsLoad, poleDemand } from '../../src/blocks/load.ts'
import { edgeBandwidth, multiplexer } from '../../src/blocks/multiplexer.ts'
import { caseOf, nodeOf, type Overrides, outcomeOf, walkAll, worstMargin } from './bench.ts'

const margin = (over: Overrides = {}, name = 'speed') => worstMargin(caseOf(16, over), multiplexer, name)

describe('the output multiplexer', () => {
  // values.json A09: first order, 10 to 90 % rise time times bandwidth ln(9)/(2π) = 0.349699 (Johnson & Graham 1993).
  it('published: its bandwidth gives an edge of 0.6 of the unit interval', () => {
    expect(Math.abs((edgeBandwidth.run(1e-10) * 0.6e-10) / 0.349699 - 1)).toBeLessThan(1e-3)
  })

  it('independent: at the demanded speed the pole of A = g_m R, 1/(2πRC) lies at the bandwidth', () => {
    const [BW, A, l, C_gg] = [20e9, 1.4, 4.7, 1e-15]
    const g_m = 2 * Math.PI * poleDemand.run(BW, A, l, 1) * C_gg
    expect(1 / (2 * Math.PI * (A / g_m) * l * C_gg) / BW).toBeCloseTo(1, 12)
  })

  it('law: each further leg adds a drain to the load', () => {
    expect(
      legsLoad.run(1, 1.4, 0.28, 0.6, 4, 0.6, 0.35) - legsLoad.run(1, 1.4, 0.28, 0.6, 2, 0.6, 0.35),
    ).toBeCloseTo(1.2, 12)
  })

  it('law: higher rate, more legs or more load lower the margin, peaking and less overlap raise it', () => {
    expect(margin({ data_rate: 112e9 })).toBeLessThan(margin())
    expect(margin({ transmitter: { multiplexer: '4:1' } })).toBeLessThan(margin())
    expect(margin({ transmitter: { multiplexer_fan_out: 2 } })).toBeLessThan(margin())
    expect(margin({ peaking: { transmit: 'shunt-flat' } })).toBeGreaterThan(margin())
    const node = nodeOf(16)
    const light = { ...node, nmos: { ...node.nmos, C_ext: 0.5 * node.nmos.C_ext } }
    expect(worstMargin(caseOf(light), multiplexer, 'speed')).toBeGreaterThan(margin())
  })

  it('law: the rule of thumb grows with the fan-out', () => {
    const rule = (fan: number) =>
      outcomeOf(caseOf(16, { transmitter: { multiplexer_fan_out: fan } }), multiplexer, 'speed').rule!
        .required!
    expect(rule(1)).toBeCloseTo(2.3 * 28e9, 0)
    expect(rule(3) / rule(1)).toBeCloseTo(3, 12)
  })

  it('is asked of current-mode transmitters only', () => {
    expect(multiplexer.asked(caseOf(16)).yes).toBe(true)
    expect(multiplexer.asked(caseOf(16, { transmitter: { kind: 'source-series' } })).yes).toBe(false)
  })

  it('fails below 1, never unknown, without an operating point', () => {
    for (const name of ['speed', 'headroom']) {
      const found = outcomeOf(caseOf(28, { supply: { voltage: 0.4 } }), multiplexer, name)
      expect(found.margin).toBeLessThan(1)
      expect(found.margin).toBeGreaterThan(0)
    }
  })

  it.each([
    ['passing', 16, {}],
    ['failing', 180, { transmitter: { multiplexer: '4:1', multiplexer_fan_out: 2 } }],
    ['lifted supply', 28, { supply: { voltage: 1.2 } }],
    ['no operating point', 28, { supply: { voltage: 0.4 } }],
  ] as const)('evaluates with mathjs: %s', (_, nm, settings) => {
    expect(walkAll(caseOf(nm, settings), multiplexer)).toBeGreaterThan(100)
  })
})
