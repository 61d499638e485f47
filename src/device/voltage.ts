import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { rootBetween } from '../numeric/root.ts'
import { type Charge, chargeAt, currentDensity, inversionOfCharge } from './charge.ts'
import type { DeviceHere } from './conditions.ts'

const EKV =
  'C. Enz, F. Chicco, A. Pezzotta, Nanoscale MOSFET modeling, IEEE Solid-State Circuits Magazine 9(3) and 9(4), 2017'

/** How many thermal voltages of V_DS a role keeps at least: gain devices 4, clock and latch pairs 3. */
export const GAIN_FLOOR = {
  symbol: 'c_sat',
  meaning: 'least saturation voltage of a gain device in thermal voltages',
  unit: '1',
  source: 'common practice, no source',
  value: 4,
}
export const SWITCH_FLOOR = {
  symbol: 'c_sat',
  meaning: 'least saturation voltage of a clock or latch pair in thermal voltages',
  unit: '1',
  source: 'common practice, no source',
  value: 3,
}

/** q_d = max(λ IC/2, e⁻⁴ q_s). lambda [1], IC [1], q_s [1] → [1]. */
export const drainCharge = formula(
  {
    symbol: 'q_d',
    meaning: 'normalised inversion charge at the drain at the edge of saturation',
    unit: '1',
    source: EKV,
  },
  (lambda, IC, q_s) => Math.max((lambda * IC) / 2, Math.exp(-4) * q_s),
)

/** V_DSsat = max{c U_T, U_T[2(q_s − q_d) + ln(q_s/q_d)]} + 2 J R_s. c_sat [1], U_T [V], q_s [1], q_d [1], J [A/m], R_s [Ω m] → [V]. */
export const saturationVoltage = formula(
  { symbol: 'V_DSsat', meaning: 'saturation voltage', unit: 'V', source: EKV },
  (c_sat, U_T, q_s, q_d, J, R_s) =>
    Math.max(c_sat * U_T, U_T * (2 * (q_s - q_d) + Math.log(q_s / q_d))) + 2 * J * R_s,
)

/** V_GS = V_T + (n − 1) V_S + n U_T (2 q_s + ln q_s) + J R_s. V_T [V], n [1], V_S [V] above bulk, U_T [V], q_s [1], J [A/m], R_s [Ω m] → [V]. */
export const gateVoltage = formula(
  { symbol: 'V_GS', meaning: 'gate–source voltage, body effect included', unit: 'V', source: EKV },
  (V_T, n, V_S, U_T, q_s, J, R_s) => V_T + (n - 1) * V_S + n * U_T * (2 * q_s + Math.log(q_s)) + J * R_s,
)

/**
 * Saturation voltage of a transistor that carries J.
 *
 * @param device transistor at its operating point
 * @param J current per width [A/m]
 * @param c_sat floor in thermal voltages: 4 gain, 3 clock and latch pairs [1]
 * @param t trace
 * @returns V_DSsat [V]
 */
export function saturationVoltageAt(device: DeviceHere, J: number, c_sat: number, t: Trace): number {
  return saturationVoltageOf(device, J, chargeAt(device, J, t), c_sat, t)
}

/** As above, for callers that already know the charge. */
export function saturationVoltageOf(
  device: DeviceHere,
  J: number,
  { IC, q_s }: Charge,
  c_sat: number,
  t: Trace,
): number {
  const q_d = t.calc(drainCharge, device.lambda, IC, q_s)
  return t.calc(saturationVoltage, c_sat, device.U_T, q_s, q_d, J, device.of.R_s)
}

/**
 * Gate–source voltage of a transistor that carries J with its source V_S above the bulk.
 *
 * @param device transistor at its operating point
 * @param J current per width [A/m]
 * @param V_S source voltage above bulk [V]
 * @param t trace
 * @returns V_GS [V]
 */
export function gateVoltageAt(device: DeviceHere, J: number, V_S: number, t: Trace): number {
  return gateVoltageOf(device, J, chargeAt(device, J, t), V_S, t)
}

/** As above, for callers that already know the charge. */
export function gateVoltageOf(device: DeviceHere, J: number, { q_s }: Charge, V_S: number, t: Trace): number {
  if (V_S === 0) t.leaf(AT_GROUND, V_S)
  return t.calc(gateVoltage, device.V_T, device.of.n, V_S, device.U_T, q_s, J, device.of.R_s)
}

const AT_GROUND = {
  symbol: 'V_S',
  meaning: 'source at the potential of the bulk',
  unit: 'V',
  source: 'definition',
}

/** Root in ln q_s: at most what the voltage gives without source resistance, seldom e⁶ times less. */
function chargeRoot(spare: (x: number) => number, reduced: number): number {
  const high = reduced > 0 ? Math.log(reduced / 2 + 1) : reduced
  const below = spare(high - 6)
  const [low, atLow] = below < 0 ? [high - 6, below] : [-60, spare(-60)]
  return rootBetween(spare, low, atLow, high, spare(high), 1e-12, true)
}

/**
 * Current per width at which a transistor takes a given gate–source voltage, source on the bulk.
 *
 * Solved in ln q_s, in which V_GS rises without bound on both sides, so a root always exists.
 *
 * @param device transistor at its operating point
 * @param V_GS gate–source voltage [V]
 * @param t trace
 * @returns J [A/m]
 */
export function densityAtGateVoltage(device: DeviceHere, V_GS: number, t: Trace): number {
  const { n, R_s, L } = device.of
  const spare = (x: number): number => {
    const q = Math.exp(x)
    const J = currentDensity.run(inversionOfCharge.run(q, device.lambda), device.I_spec, L)
    return gateVoltage.run(device.V_T, n, 0, device.U_T, q, J, R_s) - V_GS
  }
  const q_s = Math.exp(chargeRoot(spare, (V_GS - device.V_T) / (n * device.U_T)))
  const found = t.search(
    {
      symbol: 'q_s',
      meaning: 'normalised inversion charge at the given gate–source voltage',
      unit: '1',
      source: EKV,
      residual: 'V_T + n U_T (2 q_s + ln q_s) + J(q_s) R_s - V_GS',
      tolerance: '1e-12 relative in ln q_s',
    },
    q_s,
    t.recording
      ? { V_T: device.V_T, n, U_T: device.U_T, lambda: device.lambda, I_spec: device.I_spec, R_s, L, V_GS }
      : undefined,
  )
  const IC = t.calc(inversionOfCharge, found, device.lambda)
  return t.calc(currentDensity, IC, device.I_spec, L)
}
