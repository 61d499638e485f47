import { describe, expect, test } from 'vitest'
import { PLAIN } from '../../src/derivation/trace.ts'
import { inversionOfCharge, sourceCharge } from '../../src/device/charge.ts'
import { transconductanceAt } from '../../src/device/speed.ts'
import { densityAtGateVoltage, gateVoltageAt, saturationVoltageAt } from '../../src/device/voltage.ts'
import { off, transistor } from './bench.ts'

describe('charge, current and gate voltage (law)', () => {
  test('inversion coefficient → charge → inversion coefficient, twelve decades, λ from 0 to 2', () => {
    for (const lambda of [0, 0.1, 0.5, 2]) {
      for (let decade = -6; decade <= 6; decade++) {
        const IC = 10 ** decade
        // The subtraction of 1 in q_s costs about 1e-16/IC of relative precision.
        const loss = 1e-10 + 1e-15 / IC
        expect(off(inversionOfCharge.run(sourceCharge.run(IC, lambda), lambda), IC)).toBeLessThan(loss)
      }
    }
  })

  test('current → V_GS → current', () => {
    for (const T of [233.15, 300, 398.15]) {
      const device = transistor({}, { corner: 'slow', T, c_mu: 0.9, dV_T: 0.04, dV_age: 0.025, tol_V: 0 })
      for (const J of [1e-3, 0.1, 1, 10, 100, 1000]) {
        expect(off(densityAtGateVoltage(device, gateVoltageAt(device, J, 0, PLAIN), PLAIN), J)).toBeLessThan(
          1e-9,
        )
      }
    }
  })

  test('g_m is the slope of the current over V_GS, source resistance included', () => {
    const device = transistor()
    const h = 1e-5
    for (const V of [0.1, 0.3, 0.4, 0.6, 0.9]) {
      const above = densityAtGateVoltage(device, V + h, PLAIN)
      const below = densityAtGateVoltage(device, V - h, PLAIN)
      const g_m = transconductanceAt(device, densityAtGateVoltage(device, V, PLAIN), PLAIN)
      expect(off((above - below) / (2 * h), g_m)).toBeLessThan(1e-6)
    }
  })

  test('weak inversion: 60 mV times n per decade at 300 K', () => {
    const device = transistor({ R_s: 0 })
    const perDecade = gateVoltageAt(device, 1e-3, 0, PLAIN) - gateVoltageAt(device, 1e-4, 0, PLAIN)
    expect(off(perDecade, device.of.n * device.U_T * Math.LN10)).toBeLessThan(1e-4)
  })

  test('body effect: V_GS rises by n − 1 times the source voltage', () => {
    const device = transistor()
    const rise = gateVoltageAt(device, 100, 0.3, PLAIN) - gateVoltageAt(device, 100, 0, PLAIN)
    expect(rise).toBeCloseTo((device.of.n - 1) * 0.3, 12)
  })

  test('source resistance: 1/g_m grows by R_s, V_GS by J R_s, V_DSsat by 2 J R_s', () => {
    const [bare, loaded] = [transistor({ R_s: 0 }), transistor({ R_s: 2e-4 })]
    for (const J of [1, 30, 500]) {
      const rise = 1 / transconductanceAt(loaded, J, PLAIN) - 1 / transconductanceAt(bare, J, PLAIN)
      expect(off(rise, 2e-4)).toBeLessThan(1e-9)
      const dV_GS = gateVoltageAt(loaded, J, 0, PLAIN) - gateVoltageAt(bare, J, 0, PLAIN)
      expect(dV_GS).toBeCloseTo(J * 2e-4, 12)
      const dV_DS = saturationVoltageAt(loaded, J, 4, PLAIN) - saturationVoltageAt(bare, J, 4, PLAIN)
      expect(dV_DS).toBeCloseTo(2 * J * 2e-4, 12)
    }
  })

  test('a source resistance that dominates leaves g_m → 1/R_s', () => {
    const device = transistor({ R_s: 10 })
    expect(off(transconductanceAt(device, 100, PLAIN), 0.1)).toBeLessThan(1e-3)
  })
})
