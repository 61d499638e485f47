import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { PLAIN } from '../../src/derivation/trace.ts'
import { chargeAt } from '../../src/device/charge.ts'
import type { OperatingPoint } from '../../src/device/conditions.ts'
import { channelSpeed, effectiveSpeed, speedAt } from '../../src/device/speed.ts'
import { densityAtGateVoltage, gateVoltageAt, saturationVoltageAt } from '../../src/device/voltage.ts'
import type { DeviceValues } from '../../src/nodes/keys.ts'
import { off, transistor } from './bench.ts'

interface AtDensity {
  readonly J: number
  readonly IC: number
  readonly q_s: number
  readonly g_m: number
  readonly C_gg: number
  readonly f_T_int: number
  readonly f_T_eff: number
  readonly f_T_ch: number
  readonly V_DSsat: number
  readonly V_GS: number
}
interface Point {
  readonly device: string
  readonly corner: OperatingPoint['corner']
  readonly T: number
  readonly c_mu: number
  readonly dV_T: number
  readonly atDensity: readonly AtDensity[]
  readonly atGateVoltage: readonly { readonly V_GS: number; readonly J: number }[]
}
const fixture = JSON.parse(
  readFileSync(new URL('../outside/fixtures/device-points.json', import.meta.url), 'utf8'),
) as { devices: Record<string, Partial<DeviceValues>>; points: Point[] }

// Independent: mpmath, 40 digits, charge and current found by searches instead of the closed forms.
describe.each(fixture.points)('$device, $corner, $T K (independent)', (point) => {
  const { corner, T, c_mu, dV_T } = point
  const device = transistor(fixture.devices[point.device]!, { corner, T, c_mu, dV_T, dV_age: 0, tol_V: 0 })

  test.each(point.atDensity)('at $J A/m', (expected) => {
    const { J } = expected
    const { q_s } = chargeAt(device, J, PLAIN)
    const speed = speedAt(device, J, PLAIN)
    const found: Omit<AtDensity, 'J'> = {
      IC: speed.IC,
      q_s,
      g_m: speed.g_m,
      C_gg: speed.C_gg,
      f_T_int: speed.f_T_int,
      f_T_eff: effectiveSpeed(device, speed, PLAIN),
      f_T_ch: channelSpeed(device, J, PLAIN),
      V_DSsat: saturationVoltageAt(device, J, 4, PLAIN),
      V_GS: gateVoltageAt(device, J, 0, PLAIN),
    }
    for (const [name, value] of Object.entries(found)) {
      // Weak inversion loses digits where 1 is subtracted in the charge.
      expect(off(value, expected[name as keyof AtDensity]), name).toBeLessThan(1e-11)
    }
  })

  test.each(point.atGateVoltage)('current at V_GS = $V_GS V', ({ V_GS, J }) => {
    expect(off(densityAtGateVoltage(device, V_GS, PLAIN), J)).toBeLessThan(1e-9)
  })
})
