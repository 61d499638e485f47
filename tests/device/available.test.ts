import { describe, expect, test } from 'vitest'
import { PLAIN } from '../../src/derivation/trace.ts'
import { capability, densityForSpeed } from '../../src/device/available.ts'
import { cornerPoint, deviceAt, typicalPoint } from '../../src/device/conditions.ts'
import { transconductanceAt } from '../../src/device/speed.ts'
import { linearPair } from '../../src/device/stacks/linear-pair.ts'
import { type SwitchedPair, switchedPair } from '../../src/device/stacks/switched-pair.ts'
import type { Stage } from '../../src/device/stage.ts'
import { gateVoltageAt, saturationVoltageAt } from '../../src/device/voltage.ts'
import { type NodeClass, nodeOf } from '../blocks/bench.ts'

const deviceOf = (nm: NodeClass, at = typicalPoint(300)) => deviceAt(nodeOf(nm).nmos, at, PLAIN)
const coldSlow = (nm: NodeClass) => cornerPoint(nodeOf(nm), 'slow', 233.15, 0.05, 0.025)

const pair = (nm: NodeClass, over: Partial<SwitchedPair> = {}, at = typicalPoint(300)): Stage =>
  switchedPair({
    device: deviceOf(nm, at),
    V_sw: 0.3,
    V_sw_in: 0.3,
    A: 1.4,
    V_m: 0.05,
    V_tail: 0.12,
    coupling: 'dc',
    clockPairBelow: false,
    c_sat: 3,
    ownSaturation: false,
    ...over,
  })

const speedUnder = (stage: Stage, V: number): number => {
  const { J } = capability(stage, V, PLAIN)
  return J === null ? 0 : stage.speed(J, PLAIN)
}

describe('capability of a switched pair (method 1.1)', () => {
  test('law: the binding line holds with equality, to the tolerance of the search', () => {
    const stage = pair(5)
    const found = capability(stage, 0.65, PLAIN)
    expect(found.binding).toBe('crossing')
    expect(stage.supplyNeeded(found.J!, PLAIN)).toBeCloseTo(0.65, 8)
  })

  test('law: where gain and swing bind, V_sw g_m(J/2) = A J', () => {
    const device = deviceOf(65)
    const found = capability(pair(65), 1.1, PLAIN)
    expect(found.binding).toBe('gain–swing')
    expect((0.3 * transconductanceAt(device, found.J! / 2, PLAIN)) / (1.4 * found.J!)).toBeCloseTo(1, 8)
  })

  test('independent: the lines written out again give the same supply', () => {
    const device = deviceOf(16)
    const J = 40
    const V_S = 0.12
    const input = gateVoltageAt(device, J, V_S, PLAIN) + V_S + 0.05
    const crossing = gateVoltageAt(device, J / 2, V_S, PLAIN) + V_S + 0.15 + 0.05
    const output = V_S + saturationVoltageAt(device, J, 3, PLAIN) + 0.05 + 0.3
    expect(pair(16).supplyNeeded(J, PLAIN)).toBeCloseTo(Math.max(input, crossing, output), 12)
    const upper = V_S + saturationVoltageAt(device, J, 3, PLAIN)
    const clock = gateVoltageAt(device, J, V_S, PLAIN) + V_S + 0.05 + saturationVoltageAt(device, J, 3, PLAIN)
    const stacked = Math.max(
      gateVoltageAt(device, J, upper, PLAIN) + upper + 0.05,
      gateVoltageAt(device, J / 2, upper, PLAIN) + upper + 0.15 + 0.05,
      upper + saturationVoltageAt(device, J, 3, PLAIN) + 0.05 + 0.3,
      clock,
    )
    expect(pair(16, { clockPairBelow: true }).supplyNeeded(J, PLAIN)).toBeCloseTo(stacked, 12)
  })

  test('law: more supply never costs speed, a higher stack never gains any', () => {
    for (const nm of [65, 28, 16, 5] as const) {
      let last = 0
      for (let V = 0.5; V < 1.4; V += 0.05) {
        const now = speedUnder(pair(nm), V)
        expect(now).toBeGreaterThanOrEqual(last * (1 - 1e-9))
        expect(speedUnder(pair(nm, { clockPairBelow: true }), V)).toBeLessThanOrEqual(now * (1 + 1e-9))
        last = now
      }
    }
  })

  test('with no operating point it names the lowest supply that has one, and that supply has one', () => {
    const stage = pair(28)
    const found = capability(stage, 0.4, PLAIN)
    expect(found.J).toBeNull()
    if (found.J !== null || found.V_any === null) throw new Error('expected a lowest supply')
    expect(found.V_any).toBeGreaterThan(0.4)
    expect(capability(stage, found.V_any * 1.0001, PLAIN).J).not.toBeNull()
  })

  test('where no supply helps, the line is named and the shortfall is a number below 1', () => {
    const found = capability(pair(5, { V_sw: 0.02 }), 5, PLAIN)
    if (found.J !== null) throw new Error('a swing below A n U_T cannot switch a like stage')
    expect(found.binding).toBe('gain–swing')
    expect(found.V_any).toBeNull()
    expect(found.window.impossible).toBeLessThan(1)
  })

  test('law: at core supply, cold and slow, a stacked stage at 16 nm is faster than one at 5 nm', () => {
    const tailLess = { clockPairBelow: true, V_tail: 0 }
    const fast16 = speedUnder(pair(16, tailLess, coldSlow(16)), 0.8 * 0.95)
    const fast5 = speedUnder(pair(5, tailLess, coldSlow(5)), 0.72 * 0.95)
    expect(fast16).toBeGreaterThan(fast5)
    const buffer16 = speedUnder(pair(16, {}, coldSlow(16)), 0.8 * 0.95)
    expect(buffer16).toBeGreaterThan(speedUnder(pair(5, {}, coldSlow(5)), 0.72 * 0.95))
  })
})

describe('current per width for a wanted speed', () => {
  test('law: the speed at the density found is the speed wanted', () => {
    const stage = pair(28)
    const found = capability(stage, 0.95, PLAIN)
    const { J, reached } = densityForSpeed(stage, found, () => 60e9, 1.15)
    expect(reached).toBe(true)
    expect(stage.speed(J, PLAIN)).toBeCloseTo(69e9, -2)
  })

  test('out of reach is said, at the largest density that any supply allows', () => {
    const stage = pair(28)
    const found = capability(stage, 0.95, PLAIN)
    const { J, reached } = densityForSpeed(stage, found, () => 900e9, 1)
    expect(reached).toBe(false)
    expect(J).toBeLessThanOrEqual(stage.J_lim)
  })
})

describe('linear pair', () => {
  const linear = (nm: NodeClass, A: number): Stage =>
    linearPair({ device: deviceOf(nm), V_sw: 0.375, V_lin: 0.3, V_pk: 0.3 / (4 * A), A, V_tail: 0.12 })

  test('independent: both lines written out again', () => {
    const device = deviceOf(28)
    const J = 60
    const input = gateVoltageAt(device, J, 0.12, PLAIN) + 0.12 + 0.3 / 5.6 + 0.375 / 2
    const output = 0.12 + saturationVoltageAt(device, J, 4, PLAIN) + 0.375 / 2 + 0.075
    expect(linear(28, 1.4).supplyNeeded(J, PLAIN)).toBeCloseTo(Math.max(input, output), 12)
  })

  test('law: more gain from the same swing costs speed', () => {
    expect(speedUnder(linear(28, 2), 2)).toBeLessThan(speedUnder(linear(28, 1.2), 2))
  })
})
