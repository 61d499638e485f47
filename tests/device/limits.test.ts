import { describe, expect, test } from 'vitest'
import { PLAIN } from '../../src/derivation/trace.ts'
import { currentDensity, inversionOfCharge } from '../../src/device/charge.ts'
import type { DeviceHere } from '../../src/device/conditions.ts'
import { intrinsicTransitFrequency, speedAt, transconductanceAt } from '../../src/device/speed.ts'
import { saturationVoltageAt } from '../../src/device/voltage.ts'
import { off, transistor, UNLIMITED } from './bench.ts'

/** Current per width [A/m] at an inversion coefficient or at a source charge. */
const atInversion = (device: DeviceHere, IC: number): number =>
  currentDensity.run(IC, device.I_spec, device.of.L)
const atCharge = (device: DeviceHere, q_s: number): number =>
  atInversion(device, inversionOfCharge.run(q_s, device.lambda))

// Each expected value is a law of the method note, section 1; deep in its limit it must hold to 1e-4.
describe('limits of the charge model (law)', () => {
  test.each([1, 1.08, 1.35])('weak inversion: g_m → I_D/(n U_T), n = %d', (n) => {
    const device = transistor({ n, R_s: 0 })
    const J = atInversion(device, 1e-6)
    expect(off(transconductanceAt(device, J, PLAIN), J / (n * device.U_T))).toBeLessThan(1e-4)
  })

  test.each([1, 1.35])('long channel, strong inversion: g_m → √(2 β I_D/n), n = %d', (n) => {
    const device = transistor({ n, R_s: 0, v_sat: UNLIMITED })
    const J = atInversion(device, 1e8)
    const beta = (device.mu * device.of.C_ox) / device.of.L
    expect(off(transconductanceAt(device, J, PLAIN), Math.sqrt((2 * beta * J) / n))).toBeLessThan(1e-4)
  })

  test.each([1, 1.35])('velocity saturation: g_m → W C_ox v_sat, n = %d', (n) => {
    const device = transistor({ n, R_s: 0 })
    const J = atInversion(device, 1e7)
    expect(off(transconductanceAt(device, J, PLAIN), device.of.C_ox * device.of.v_sat)).toBeLessThan(1e-4)
  })

  test('n = 1, no extrinsic parts, strong inversion: f_T → 3 µ V_ov/(4π L²)', () => {
    const device = transistor({ n: 1, C_ext: 0, R_s: 0, v_sat: UNLIMITED })
    const q_s = 1e5
    const V_ov = 2 * device.of.n * device.U_T * q_s
    const expected = (3 * device.mu * V_ov) / (4 * Math.PI * device.of.L ** 2)
    expect(off(speedAt(device, atCharge(device, q_s), PLAIN).f_T_int, expected)).toBeLessThan(1e-4)
  })

  test('velocity saturation with C_gg = W L C_ox: f_T → v_sat/(2π L)', () => {
    const device = transistor({ R_s: 0 })
    const { L, C_ox, v_sat } = device.of
    const g_m = transconductanceAt(device, atInversion(device, 1e7), PLAIN)
    expect(off(intrinsicTransitFrequency.run(g_m, L * C_ox), v_sat / (2 * Math.PI * L))).toBeLessThan(1e-4)
  })

  test('gate capacitance: (n − 1)/n of the area in weak, 2/3 + (n − 1)/(3n) in strong inversion', () => {
    const device = transistor({ C_ext: 0, v_sat: UNLIMITED })
    const { L, C_ox, n } = device.of
    const weak = speedAt(device, atCharge(device, 1e-6), PLAIN).C_gg
    const strong = speedAt(device, atCharge(device, 1e5), PLAIN).C_gg
    expect(off(weak, (L * C_ox * (n - 1)) / n)).toBeLessThan(1e-4)
    expect(off(strong, L * C_ox * (2 / 3 + (n - 1) / (3 * n)))).toBeLessThan(1e-4)
  })

  test('saturation voltage: the floor in weak, V_ov/n (1 − e⁻⁴) in strong inversion of a long channel', () => {
    const device = transistor({ R_s: 0, v_sat: UNLIMITED })
    expect(saturationVoltageAt(device, atCharge(device, 1e-4), 5, PLAIN)).toBe(5 * device.U_T)
    const q_s = 1e6
    const expected = 2 * device.U_T * q_s * (1 - Math.exp(-4))
    expect(off(saturationVoltageAt(device, atCharge(device, q_s), 4, PLAIN), expected)).toBeLessThan(1e-4)
  })

  test('velocity saturation lowers the saturation voltage at the same charge', () => {
    const long = transistor({ R_s: 0, v_sat: UNLIMITED })
    const short = transistor({ R_s: 0 })
    const V_short = saturationVoltageAt(short, atCharge(short, 10), 4, PLAIN)
    expect(V_short).toBeLessThan(0.8 * saturationVoltageAt(long, atCharge(long, 10), 4, PLAIN))
  })
})
