import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { chargeAt } from './charge.ts'
import type { DeviceHere } from './conditions.ts'
import { laidOutCapacitance, type SpeedHere, speedAt } from './speed.ts'
import { densityAtGateVoltage, GAIN_FLOOR, saturationVoltageOf } from './voltage.ts'

/** Devices whose gate–source voltage is given by the circuit, so that no current per width is left to choose. */

/** V_GS = min(V_g, V). V_g [V] gate voltage of the circuit, V [V] supply → [V]. */
export const givenGateVoltage = formula(
  {
    symbol: 'V_GS',
    meaning: 'gate–source voltage that the circuit gives under its supply',
    unit: 'V',
    source: 'method of this planner',
  },
  (V_g, V) => Math.min(V_g, V),
)

/** A device at a given gate–source voltage: current per width [A/m] and speed. SI. */
export interface FixedBias extends SpeedHere {
  readonly V_GS: number
  readonly J: number
}

/** A device at a gate–source voltage V_GS [V]: current per width, transconductance, capacitance, intrinsic f_T. */
export function fixedBiasAt(device: DeviceHere, V_GS: number, t: Trace): FixedBias {
  const J = densityAtGateVoltage(device, V_GS, t)
  return { ...speedAt(device, J, t), V_GS, J }
}

const SHARED = 'derived: both devices carry one current, so the pMOS is J_n/J_p times as wide'

/** r = J_n/J_p: width of the pMOS over that of the nMOS. J_n [A/m], J_p [A/m] → [1]. */
export const widthRatio = formula(
  { symbol: 'r_w', meaning: 'width of the pMOS over that of the nMOS', unit: '1', source: SHARED },
  (J_n, J_p) => J_n / J_p,
)

/** f_T = (g_mn + r g_mp)/(2π(C_n + r C_p)). g_mn [S/m], r_w [1], g_mp [S/m], C_n [F/m], C_p [F/m] → [Hz]. */
export const inverterTransitFrequency = formula(
  {
    symbol: 'f_T',
    meaning: 'intrinsic transit frequency of an nMOS and a pMOS sharing current',
    unit: 'Hz',
    source: SHARED,
  },
  (g_mn, r_w, g_mp, C_n, C_p) => (g_mn + r_w * g_mp) / (2 * Math.PI * (C_n + r_w * C_p)),
)

/** c_lay = (C_lay_n + r C_lay_p)/(C_n + r C_p). C_lay_n [F/m], r_w [1], C_lay_p [F/m], C_n [F/m], C_p [F/m] → [1]. */
export const inverterLayoutShare = formula(
  { symbol: 'c_lay', meaning: 'layout over intrinsic gate capacitance', unit: '1', source: SHARED },
  (C_lay_n, r_w, C_lay_p, C_n, C_p) => (C_lay_n + r_w * C_lay_p) / (C_n + r_w * C_p),
)

/** A_0 = (g_mn + r g_mp)/(J_n/(V_E_n L_n) + J_n/(V_E_p L_p)). g_mn [S/m], r_w [1], g_mp [S/m], J_n [A/m], V_E_n [V/m], L_n [m], V_E_p [V/m], L_p [m] → [1]. */
export const inverterSelfGain = formula(
  { symbol: 'A_0', meaning: 'self-gain of the complementary pair', unit: '1', source: SHARED },
  (g_mn, r_w, g_mp, J_n, V_E_n, L_n, V_E_p, L_p) =>
    (g_mn + r_w * g_mp) / (J_n / (V_E_n * L_n) + J_n / (V_E_p * L_p)),
)

/** An nMOS and a pMOS biased at half their supply. SI. */
export interface Inverter {
  readonly n: FixedBias
  readonly p: FixedBias
  readonly r_w: number
  readonly f_T: number
  readonly c_lay: number
}

/** A complementary stage whose devices both stand at V_half [V], the pMOS widened until it carries the same current. */
export function inverterAt(nmos: DeviceHere, pmos: DeviceHere, V_half: number, t: Trace): Inverter {
  return inverterWith(fixedBiasAt(nmos, V_half, t), nmos, pmos, t)
}

/** As above, for callers that already know the bias of the nMOS. */
export function inverterWith(n: FixedBias, nmos: DeviceHere, pmos: DeviceHere, t: Trace): Inverter {
  const p = fixedBiasAt(pmos, n.V_GS, t)
  const r_w = t.calc(widthRatio, n.J, p.J)
  return {
    n,
    p,
    r_w,
    f_T: t.calc(inverterTransitFrequency, n.g_m, r_w, p.g_m, n.C_gg, p.C_gg),
    c_lay: t.calc(inverterLayoutShare, nmos.of.C_lay, r_w, pmos.of.C_lay, n.C_gg, p.C_gg),
  }
}

/** Saturation voltage [V] of a gain device at a fixed bias. */
export function saturationAt(device: DeviceHere, { J }: FixedBias, t: Trace): number {
  return saturationVoltageOf(device, J, chargeAt(device, J, t), t.leaf(GAIN_FLOOR, GAIN_FLOOR.value), t)
}

/** Gate capacitance per width as laid out [F/m] at a fixed bias. */
export function laidOutAt(device: DeviceHere, { C_gg }: FixedBias, t: Trace): number {
  return t.calc(laidOutCapacitance, C_gg, device.of.C_lay)
}
