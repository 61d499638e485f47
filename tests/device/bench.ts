import { PLAIN } from '../../src/derivation/trace.ts'
import { type DeviceHere, deviceAt, type OperatingPoint, typicalPoint } from '../../src/device/conditions.ts'
import type { DeviceValues } from '../../src/nodes/keys.ts'

/** An invented transistor in SI, of the size of a 28 nm class. */
export const INVENTED: DeviceValues = {
  L: 32e-9,
  n: 1.28,
  mu0: 0.021,
  v_sat: 1.1e5,
  C_ox: 0.0195,
  C_ext: 3.7e-10,
  C_lay: 4.1e-10,
  R_s: 1.35e-4,
  V_T0: 0.36,
  V_E: 3.2e7,
  J_max: 550,
  J_peak: 450,
  gamma: 1.2,
  A_VT: 2.2e-9,
}

/** A saturation velocity that no current reaches: makes λ vanish. */
export const UNLIMITED = 1e40

/** The invented transistor with some values changed, at an operating point (typical, 300 K unless given). */
export function transistor(
  changes: Partial<DeviceValues> = {},
  at: OperatingPoint = typicalPoint(300),
): DeviceHere {
  return deviceAt({ ...INVENTED, ...changes }, at, PLAIN)
}

/** Distance from an expected value, relative to it. */
export const off = (value: number, expected: number): number => Math.abs(value / expected - 1)
