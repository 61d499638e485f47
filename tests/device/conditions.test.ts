import { describe, expect, test } from 'vitest'
import { PLAIN } from '../../src/derivation/trace.ts'
import { type OperatingPoint, saturationVelocity, typicalPoint } from '../../src/device/conditions.ts'
import { complementarySpeed, effectiveSpeed, speedAt } from '../../src/device/speed.ts'
import { gateVoltageAt } from '../../src/device/voltage.ts'
import { INVENTED, off, transistor } from './bench.ts'

const corner = (name: OperatingPoint['corner'], c_mu: number, dV_T: number): OperatingPoint => ({
  corner: name,
  T: 300,
  c_mu,
  dV_T,
  dV_age: 0,
  tol_V: 0,
})

describe('temperature (law)', () => {
  const [cold, hot] = [transistor({}, typicalPoint(233.15)), transistor({}, typicalPoint(398.15))]
  const ratio = 398.15 / 233.15

  test('thermal voltage ∝ T and 25.852 mV at 300 K', () => {
    expect(off(hot.U_T / cold.U_T, ratio)).toBeLessThan(1e-12)
    // published: k_B = 8.617333262e-5 eV/K, CODATA 2018
    expect(transistor().U_T).toBeCloseTo(300 * 8.617333262e-5, 11)
  })

  test('mobility ∝ T^−1.3, saturation velocity ∝ T^−0.5', () => {
    expect(off(hot.mu / cold.mu, ratio ** -1.3)).toBeLessThan(1e-12)
    expect(
      off(saturationVelocity.run(1, 398.15) / saturationVelocity.run(1, 233.15), ratio ** -0.5),
    ).toBeLessThan(1e-12)
  })

  test('λ ∝ T^(1 − 1.3 + 0.5), specific current ∝ T^0.7', () => {
    expect(off(hot.lambda / cold.lambda, ratio ** 0.2)).toBeLessThan(1e-12)
    expect(off(hot.I_spec / cold.I_spec, ratio ** 0.7)).toBeLessThan(1e-12)
  })

  test('threshold falls by 0.7 mV per kelvin', () => {
    expect(cold.V_T - hot.V_T).toBeCloseTo(0.7e-3 * (398.15 - 233.15), 12)
  })

  test('density limit falls to 0.7 of itself above 105 °C, not at it', () => {
    expect(transistor({}, typicalPoint(378.15)).J_lim).toBe(INVENTED.J_max)
    expect(transistor({}, typicalPoint(378.16)).J_lim).toBe(0.7 * INVENTED.J_max)
  })

  test('hot is slower at the same current, in every inversion', () => {
    for (const J of [1, 10, 100, 500]) {
      expect(speedAt(hot, J, PLAIN).f_T_int).toBeLessThan(speedAt(cold, J, PLAIN).f_T_int)
    }
  })
})

describe('corners (law)', () => {
  const typical = transistor()
  const slow = transistor({}, corner('slow', 0.9, 0.04))
  const fast = transistor({}, corner('fast', 1.1, -0.04))

  test('mobility factor and threshold shift as stated, ageing on top', () => {
    expect(slow.mu).toBeCloseTo(0.9 * typical.mu, 12)
    expect(fast.V_T).toBeCloseTo(typical.V_T - 0.04, 12)
    const aged = transistor({}, { ...corner('slow', 0.9, 0.04), dV_age: 0.025 })
    expect(aged.V_T - slow.V_T).toBeCloseTo(0.025, 12)
  })

  test('at the same current the slow corner is slower and asks for more gate voltage, the fast one for less', () => {
    for (const J of [1, 10, 100, 500]) {
      const speeds = [slow, typical, fast].map((device) => speedAt(device, J, PLAIN).f_T_int)
      expect(speeds).toEqual([...speeds].sort((a, b) => a - b))
      const volts = [fast, typical, slow].map((device) => gateVoltageAt(device, J, 0, PLAIN))
      expect(volts).toEqual([...volts].sort((a, b) => a - b))
    }
  })
})

describe('pMOS and the complementary stage (law)', () => {
  const nmos = transistor()
  const pmos = transistor({ mu0: 0.4 * INVENTED.mu0, v_sat: 0.4 * INVENTED.v_sat })

  test('mobility and velocity both scaled: the same speed ratio at the same inversion, R_s left out', () => {
    const [n, p] = [
      transistor({ R_s: 0 }),
      transistor({ R_s: 0, mu0: 0.4 * INVENTED.mu0, v_sat: 0.4 * INVENTED.v_sat }),
    ]
    expect(off(speedAt(p, 0.4 * 200, PLAIN).f_T_int, 0.4 * speedAt(n, 200, PLAIN).f_T_int)).toBeLessThan(
      1e-12,
    )
  })

  test('sharing the current, the stage lies between the two transistors; two alike are as fast as one', () => {
    const both = complementarySpeed(nmos, pmos, 200, 200, false, PLAIN)
    expect(both).toBeLessThan(speedAt(nmos, 200, PLAIN).f_T_int)
    expect(both).toBeGreaterThan(speedAt(pmos, 200, PLAIN).f_T_int)
    const alike = complementarySpeed(nmos, nmos, 200, 200, true, PLAIN)
    expect(off(alike, effectiveSpeed(nmos, speedAt(nmos, 200, PLAIN), PLAIN))).toBeLessThan(1e-12)
  })

  test('layout slows by (C_gg + C_lay)/C_gg', () => {
    const speed = speedAt(nmos, 200, PLAIN)
    const slowed = speed.f_T_int / effectiveSpeed(nmos, speed, PLAIN)
    expect(off(slowed, 1 + INVENTED.C_lay / speed.C_gg)).toBeLessThan(1e-12)
  })
})
