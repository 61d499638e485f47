import { describe, expect, it } from 'vitest'
import { driverCurrent } from '../../src/blocks/current-mode-driver.ts'
import { driver } from '../../src/blocks/driver.ts'
import { sliceDemand, sliceSpeed } from '../../src/blocks/source-series-driver.ts'
import { outputDrop, outputTop } from '../../src/device/stacks/output-pair.ts'
import { caseOf, type Overrides, outcomeOf, pointsOf, resultsOf, walkAll, worstMargin } from './bench.ts'

const SERIES = { transmitter: { kind: 'source-series' } }
const margin = (nm: 65 | 28 | 16, over: Overrides = {}, name = 'speed') =>
  worstMargin(caseOf(nm, over), driver, name)

/** Node voltages of a differential output, solved here: near R0 to the supply, line and far R0 behind ac coupling. */
function outputs(
  V: number,
  I: number,
  R0: number,
): { readonly high: number; readonly low: number; readonly ppd: number } {
  // Mean current I/2 a side in the near resistor; the signal ±I/2 sees both resistors.
  const mean = V - (I / 2) * R0
  const swing = (I / 2) * (R0 / 2)
  return { high: mean + swing, low: mean - swing, ppd: 4 * swing }
}

describe('the current-mode driver', () => {
  it('independent: current, low and high output agree with the terminated circuit solved here', () => {
    const [V, R0, V_ppd] = [1.2, 50, 0.8]
    const I = driverCurrent.run(V_ppd, R0)
    const found = outputs(V, I, R0)
    expect(I).toBeCloseTo(0.016, 12)
    expect(found.ppd).toBeCloseTo(V_ppd, 12)
    expect(V - found.low).toBeCloseTo(outputDrop.run(V_ppd), 12)
    expect(found.high).toBeCloseTo(outputTop.run(V, V_ppd), 12)
  })

  it('law: higher rate or larger load lowers the speed margin, peaking raises it, more swing costs headroom', () => {
    expect(margin(65, { data_rate: 112e9 })).toBeLessThan(margin(65))
    expect(margin(65, { transmitter: { driver_fan_out: 2 } })).toBeLessThan(margin(65))
    expect(margin(65, { peaking: { transmit: 'shunt-flat' } })).toBeGreaterThan(margin(65))
    const headroom = [0.4, 0.6, 0.8, 1].map((swing) => margin(28, { transmitter: { swing } }, 'headroom'))
    headroom.slice(1).forEach((value, k) => {
      expect(value).toBeLessThanOrEqual(headroom[k]!)
    })
    expect(headroom[3]).toBeLessThan(headroom[0]!)
  })

  it('law: the output stage carries the whole current at the density of its capability', () => {
    const found = resultsOf(caseOf(28), driver)
    const value = (name: string) => found[name]!.value!
    expect(value('driver.width_m') * value('device.driver.capability.J_A_per_m')).toBeCloseTo(
      value('driver.current_A'),
      12,
    )
    const denser = resultsOf(caseOf(28, { transmitter: { swing: 0.4 } }), driver)
    expect(denser['driver.current_A']!.value).toBeCloseTo(0.5 * value('driver.current_A'), 12)
  })

  it('fails below 1 with the missing millivolts where the swing does not fit under a core supply', () => {
    const found = outcomeOf(caseOf(16), driver, 'headroom')
    expect(found.margin).toBeLessThan(1)
    expect(found.basis).toBe('output')
    expect(outcomeOf(caseOf(16), driver, 'speed').reason).toMatch(/mV short/)
  })

  it('judges stress at the high output of a lifted supply', () => {
    const found = outcomeOf(caseOf(16, { supply: { voltage: 1.2 } }), driver, 'stress')
    expect(found.available).toBeCloseTo(1.2 - 0.2 - 0.12, 12)
    expect(found.margin).toBeCloseTo(0.88 / 0.88, 12)
  })
})

describe('the source-series driver', () => {
  const asked = (over: Overrides) =>
    driver.checks
      .filter((check) => check.asked === undefined || check.asked(caseOf(16, over)))
      .map(({ name }) => name)

  it('has its own checks', () => {
    expect(asked(SERIES)).toEqual(['slices', 'symbol', 'swing'])
    expect(asked({})).toEqual(['speed', 'headroom'])
  })

  it('law: into a matched load the differential output is at most the supply', () => {
    const found = outcomeOf(
      caseOf(16, { transmitter: { kind: 'source-series', swing: 0.5 } }),
      driver,
      'swing',
    )
    expect(found.margin).toBeCloseTo(0.8 / 0.5, 12)
  })

  it('independent: slices of 15 Ω that hold 100 fF charge their like up to 106.1 GHz', () => {
    expect(sliceSpeed.run(15, 1e-13) / 106.103e9).toBeCloseTo(1, 5)
  })

  it('independent: at the demanded speed a pre-driver φ times smaller has its pole at the bandwidth', () => {
    const [BW, phi, d, R, C] = [16.8e9, 2, 0.6, 15, 1e-13]
    const faster = sliceDemand.run(BW, phi, d) / sliceSpeed.run(R, C)
    // The pre-driver has phi times the resistance and drives the gates and its own drains, C d/phi.
    const pole = faster / (2 * Math.PI * (phi * R) * (C + (C * d) / phi))
    expect(pole / BW).toBeCloseTo(1, 12)
  })

  it('law: the speed of the slices does not depend on the termination, since width scales with it', () => {
    const at = (termination: number) =>
      outcomeOf(caseOf(16, { transmitter: { kind: 'source-series', termination } }), driver, 'slices')
        .derived!.available!
    expect(at(40) / at(60)).toBeCloseTo(1, 12)
  })

  it('published: 2.5 fan-out-of-four delays a symbol (method, section 3); more only beyond a fan-out of four', () => {
    const need = (driver_fan_out: number) =>
      outcomeOf(caseOf(16, { transmitter: { kind: 'source-series', driver_fan_out } }), driver, 'symbol')
    // The test node's delay is its datum at 300 K; the typical point is at 300.15 K.
    expect(need(1).required! / (2.5 * 9e-12)).toBeCloseTo(1, 2)
    expect(need(4).required).toBe(need(1).required)
    expect(need(8).required).toBeGreaterThan(need(4).required!)
    expect(need(1).available).toBeCloseTo(1 / 28e9, 18)
  })

  it('law: higher rate or less supply lowers every margin, and none is ever unknown', () => {
    for (const name of ['slices', 'symbol', 'swing']) {
      const at = (over: Overrides) => worstMargin(caseOf(28, { ...SERIES, ...over }), driver, name)
      expect(at({ supply: { core_voltage: 0.7 } })).toBeLessThan(at({}))
      if (name !== 'swing') expect(at({ data_rate: 112e9 })).toBeLessThan(at({}))
      expect(at({ supply: { core_voltage: 0.3 } })).toBeGreaterThan(0)
    }
  })
})

describe('derivations of the driver', () => {
  it.each([
    ['passing', 65, { transmitter: { swing: 0.5 } }],
    ['failing', 180, { data_rate: 112e9 }],
    ['no operating point', 16, {}],
    ['lifted supply', 28, { supply: { voltage: 1.2 } }],
  ] as const)('current-mode, evaluates with mathjs: %s', (_, nm, settings) => {
    expect(walkAll(caseOf(nm, settings), driver)).toBeGreaterThan(100)
  })

  it.each([
    ['passing', 16, {}],
    ['failing', 180, { data_rate: 112e9 }],
    ['below threshold', 28, { supply: { core_voltage: 0.3 } }],
  ] as const)('source-series, evaluates with mathjs: %s', (_, nm, settings) => {
    const given = caseOf(nm, { ...SERIES, ...settings })
    expect(walkAll(given, driver)).toBeGreaterThan(10 * pointsOf(given).length)
  })
})
