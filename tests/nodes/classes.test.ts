import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { PLAIN } from '../../src/derivation/trace.ts'
import { cornerPoint, deviceAt, typicalPoint } from '../../src/device/conditions.ts'
import { channelSpeed, effectiveSpeed, efficiency, selfGain, speedAt } from '../../src/device/speed.ts'
import type { DeviceValues } from '../../src/nodes/keys.ts'
import { builtInClass, CLASS_IDS, classFiles } from './built-in.ts'

interface Fact {
  readonly node: string
  readonly quantity: string
  readonly value: number
  readonly unit: string
  readonly within: number | null
  readonly source: string
  readonly evidence: 'published' | 'derived' | 'estimate'
}
const { facts } = JSON.parse(
  readFileSync(new URL('../outside/device-facts.json', import.meta.url), 'utf8'),
) as { facts: readonly Fact[] }

/** A text that was seen states no spread: rounding of the table and of the fitted values. */
const UNSTATED = 0.03

const classes = CLASS_IDS.map(builtInClass)
const valuesOf = (id: string) => classes.find((one) => one.id === id)!.values
const typical = (device: DeviceValues) => deviceAt(device, typicalPoint(300), PLAIN)
const factOf = (id: string, quantity: string): Fact =>
  facts.find((fact) => fact.node === id && fact.quantity === quantity)!

/** One rule of bias for every class: published self-gains are taken to hold at a quarter of the peak density. */
function gainAtAnalogueBias(device: DeviceValues): number {
  const J = device.J_peak / 4
  const { g_m } = speedAt(typical(device), J, PLAIN)
  return selfGain.run(efficiency.run(g_m, J), device.V_E, device.L)
}

const intrinsic = (device: DeviceValues, J: number): number => speedAt(typical(device), J, PLAIN).f_T_int
const effective = (device: DeviceValues, J: number): number =>
  effectiveSpeed(typical(device), speedAt(typical(device), J, PLAIN), PLAIN)

/** What the class gives for each published quantity; both polarities at the published density of the peak. */
const MODELLED: Readonly<Record<string, (id: string) => number>> = {
  supply: (id) => valuesOf(id).supply.core,
  intrinsicSpeed: (id) => intrinsic(valuesOf(id).nmos, factOf(id, 'densityOfPeak').value),
  effectiveSpeed: (id) => effective(valuesOf(id).nmos, factOf(id, 'densityOfPeak').value),
  intrinsicSpeedPmos: (id) => intrinsic(valuesOf(id).pmos, factOf(id, 'densityOfPeak').value),
  effectiveSpeedPmos: (id) => effective(valuesOf(id).pmos, factOf(id, 'densityOfPeak').value),
  densityOfPeak: (id) => valuesOf(id).nmos.J_peak,
  selfGain: (id) => gainAtAnalogueBias(valuesOf(id).nmos),
  selfGainPmos: (id) => gainAtAnalogueBias(valuesOf(id).pmos),
  gateCapacitance: (id) => speedAt(typical(valuesOf(id).nmos), factOf(id, 'densityOfPeak').value, PLAIN).C_gg,
  threshold: (id) => valuesOf(id).nmos.V_T0,
  length: (id) => valuesOf(id).nmos.L,
  fo4: (id) => valuesOf(id).fo4,
}

describe('built-in classes against published device facts (published)', () => {
  test('every class has facts and every fact a way to be compared', () => {
    expect(new Set(facts.map(({ node }) => node))).toEqual(new Set(CLASS_IDS))
    expect(facts.filter(({ quantity }) => MODELLED[quantity] === undefined)).toEqual([])
    expect(facts.filter(({ source }) => source.length < 5)).toEqual([])
  })

  test.each(facts.filter(({ evidence }) => evidence !== 'estimate'))(
    '$node $quantity: $value $unit',
    ({ node, quantity, value, within }) => {
      expect(Math.abs(MODELLED[quantity]!(node) / value - 1)).toBeLessThan(within ?? UNSTATED)
    },
  )
})

describe('trends of the built-in classes', () => {
  // Common practice, method section 1: what must come out of the numbers, whichever sources they rest on.
  test('a 180 nm nMOS reaches 50 to 80 GHz at its best bias', () => {
    const { nmos } = valuesOf('P180')
    const best = intrinsic(nmos, nmos.J_peak) / 1e9
    expect(best).toBeGreaterThan(50)
    expect(best).toBeLessThan(80)
  })

  test('the channel alone gains 3.0 to 3.7 times from 65 to 10 nm; as laid out much less', () => {
    const channel = (id: string): number =>
      channelSpeed(typical(valuesOf(id).nmos), valuesOf(id).nmos.J_peak, PLAIN)
    const gain = channel('F10') / channel('P65')
    expect(gain).toBeGreaterThan(3)
    expect(gain).toBeLessThan(3.7)
    const [old, young] = [valuesOf('P65').nmos, valuesOf('F10').nmos]
    expect(effective(young, young.J_peak) / effective(old, old.J_peak)).toBeLessThan(gain / 2)
  })

  test('pMOS over nMOS: published ratio to 1 %, from 0.4 in old planar to 0.9 in fins', () => {
    for (const id of CLASS_IDS) {
      const { nmos, pmos } = valuesOf(id)
      const J = factOf(id, 'densityOfPeak').value
      const published = factOf(id, 'intrinsicSpeedPmos').value / factOf(id, 'intrinsicSpeed').value
      const ratio = intrinsic(pmos, J) / intrinsic(nmos, J)
      expect(Math.abs(ratio / published - 1), id).toBeLessThan(0.01)
      expect(ratio).toBeGreaterThan(0.4)
      expect(ratio).toBeLessThan(0.95)
    }
  })

  test('FO4 falls from class to class', () => {
    const delays = CLASS_IDS.map((id) => valuesOf(id).fo4)
    expect(delays).toEqual([...delays].sort((a, b) => b - a))
  })

  test('the density of the published peak is admissible', () => {
    for (const { values } of classes) {
      expect(values.nmos.J_peak).toBeLessThanOrEqual(values.nmos.J_max)
      expect(values.pmos.J_peak).toBeLessThanOrEqual(values.pmos.J_max)
    }
  })

  // Law of the model, on which the search for the capability rests: no roll-off inside the admissible density.
  test.each(CLASS_IDS)('%s: f_T rises with the current per width, both polarities, every corner', (id) => {
    const values = valuesOf(id)
    for (const corner of ['slow', 'typical', 'fast'] as const) {
      for (const T of [233.15, 300, 398.15]) {
        for (const polarity of [values.nmos, values.pmos]) {
          const device = deviceAt(polarity, cornerPoint(values, corner, T, 0.05, 0.025), PLAIN)
          const speeds = Array.from({ length: 200 }, (_, k) => {
            const J = device.J_lim * 1e-4 ** (1 - k / 199)
            return speedAt(device, J, PLAIN).f_T_int
          })
          expect(speeds.every((f, k) => k === 0 || f > speeds[k - 1]!)).toBe(true)
        }
      }
    }
  })
})

describe('provenance of the built-in classes', () => {
  test('the files are the classes and carry their own ids', () => {
    expect([...classFiles()].sort()).toEqual(CLASS_IDS.map((id) => `${id}.yaml`).sort())
    expect(classes.map(({ id }) => id)).toEqual(CLASS_IDS)
  })

  test.each(classes)('$id: every physical value states source and evidence', ({ provenance }) => {
    const physical = provenance.filter(({ value, path }) => typeof value === 'number' && path.includes('.'))
    expect(physical.length).toBeGreaterThan(35)
    for (const { path, source, evidence } of physical) {
      expect(source.length, path).toBeGreaterThan(7)
      expect(['published', 'derived', 'common practice', 'estimate'], path).toContain(evidence)
    }
  })

  test.each(classes)('$id: a value stated within x % has that spread', ({ provenance }) => {
    const ownSpread = [
      'V_T0',
      'J_peak',
      'gamma',
      'A_VT',
      'V_E',
      'fo4',
      'wire_capacitance',
      'inductor_q',
      'f_max',
    ]
    const stated = provenance.filter(
      ({ path, source }) => ownSpread.includes(path.split('.').at(-1)!) && /within \d+ %/.test(source),
    )
    expect(stated.length).toBeGreaterThan(5)
    for (const { path, source, spread } of stated) {
      const share = Number(/within (\d+) %/.exec(source)![1]) / 100
      expect(spread, path).toBeDefined()
      expect((spread!.high - spread!.low) / (spread!.high + spread!.low), path).toBeCloseTo(share, 3)
    }
  })
})
