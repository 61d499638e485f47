import { describe, expect, it } from 'vitest'
import { benchAt } from '../../src/blocks/bench.ts'
import { equaliser } from '../../src/blocks/equaliser.ts'
import { inverterChain, inverterSwingSupply } from '../../src/blocks/inverter-chain.ts'
import { PLAIN } from '../../src/derivation/trace.ts'
import { saturationAt } from '../../src/device/fixed-bias.ts'
import { caseOf, type Overrides, outcomeOf, pointsOf } from './bench.ts'

const given = (over: Overrides = {}) =>
  caseOf(16, {
    demand: { route: 'derived' },
    ...over,
    receiver: { equaliser: 'complementary', ...(over.receiver ?? {}) },
  })

/** Whether speed and swing both hold at a nominal core supply, looked at without the search. */
function works(over: Overrides, core_voltage: number, at: ReturnType<typeof pointsOf>[number]): boolean {
  const here = given({ ...over, supply: { core_voltage } })
  const { nmos, pmos, V_core, settings } = benchAt(here, at, PLAIN)
  const chain = inverterChain(benchAt(here, at, PLAIN))
  if ('unknown' in chain) throw new Error(chain.unknown)
  const { n, p } = chain.here
  const swing = inverterSwingSupply.run(
    saturationAt(nmos, n, PLAIN),
    saturationAt(pmos, p, PLAIN),
    settings.receiver.linear_swing,
  )
  return outcomeOf(here, equaliser, 'speed', at).margin! >= 1 && V_core >= swing
}

describe('the supply that complementary stages need', () => {
  // A bisection written here over the nominal supply, as an independent search.
  it.each([
    ['bound by speed', {}],
    ['bound by swing', { data_rate: 5e9, receiver: { linear_swing: 0.8 } }],
  ] as const)('independent: agrees with a plain bisection at every corner: %s', (_, over) => {
    for (const at of pointsOf(given(over))) {
      let [low, high] = [0.05, 3]
      for (let k = 0; k < 60; k++) {
        const middle = (low + high) / 2
        if (works(over, middle, at)) high = middle
        else low = middle
      }
      const found = outcomeOf(given(over), equaliser, 'headroom', at)
      const supply = high * (1 - at.tol_V)
      expect(found.required! / supply).toBeCloseTo(1, 7)
      expect(found.margin).toBeCloseTo((0.8 * (1 - at.tol_V)) / supply, 6)
    }
  })

  it('law: below threshold there is still an operating point, far below the speed asked', () => {
    const weak = given({ supply: { core_voltage: 0.4 } })
    for (const name of ['speed', 'headroom', 'self_gain']) {
      expect(outcomeOf(weak, equaliser, name).margin).toBeGreaterThan(0)
    }
    expect(outcomeOf(weak, equaliser, 'speed').margin).toBeLessThan(0.2)
    expect(outcomeOf(weak, equaliser, 'headroom').margin).toBeLessThan(1)
  })

  it('law: the swing asks for twice a saturation voltage and half the differential output', () => {
    // Each output rests at V/2 and moves V_lin/4 to either side.
    expect(inverterSwingSupply.run(0.1, 0.12, 0.4)).toBeCloseTo(2 * 0.12 + 0.4 / 2, 12)
  })
})
