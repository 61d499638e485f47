import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { chargeAt } from './charge.ts'
import type { DeviceHere } from './conditions.ts'

const EKV =
  'C. Enz, F. Chicco, A. Pezzotta, Nanoscale MOSFET modeling, IEEE Solid-State Circuits Magazine 9(3) and 9(4), 2017'

/** g_m n U_T/I_D = 2 q_s/{IC [λ(1 + λ IC) + 2]}. q_s [1], IC [1], lambda [1] → [1]; 1 in weak inversion. */
export const normalisedEfficiency = formula(
  {
    symbol: 'G',
    meaning: 'transconductance efficiency over its weak-inversion limit',
    unit: '1',
    source: EKV,
  },
  (q_s, IC, lambda) => (2 * q_s) / (IC * (lambda * (1 + lambda * IC) + 2)),
)

/** g_mi = G J/(n U_T), per width. G [1], J [A/m], n [1], U_T [V] → [S/m]. */
export const intrinsicTransconductance = formula(
  { symbol: 'g_mi', meaning: 'transconductance per width of the channel alone', unit: 'S/m', source: EKV },
  (G, J, n, U_T) => (G * J) / (n * U_T),
)

/** g_m = g_mi/(1 + g_mi R_s), per width. g_mi [S/m], R_s [Ω m] → [S/m]. */
export const degeneratedTransconductance = formula(
  {
    symbol: 'g_m',
    meaning: 'transconductance per width behind the source resistance',
    unit: 'S/m',
    source: 'circuit theory',
  },
  (g_mi, R_s) => g_mi / (1 + g_mi * R_s),
)

/** c_gs = (q_s/3)(2 q_s + 3)/(q_s + 1)². q_s [1] → [1]; 2/3 in strong inversion. */
export const gateSourceShare = formula(
  { symbol: 'c_gs', meaning: 'gate–source capacitance over gate area capacitance', unit: '1', source: EKV },
  (q_s) => ((q_s / 3) * (2 * q_s + 3)) / (q_s + 1) ** 2,
)

/** c_gb = (1 − c_gs)(n − 1)/n. c_gs [1], n [1] → [1]. */
export const gateBulkShare = formula(
  { symbol: 'c_gb', meaning: 'gate–bulk capacitance over gate area capacitance', unit: '1', source: EKV },
  (c_gs, n) => ((1 - c_gs) * (n - 1)) / n,
)

/** C_ch = L C_ox (c_gs + c_gb), per width. L [m], C_ox [F/m²], c_gs [1], c_gb [1] → [F/m]. */
export const channelCapacitance = formula(
  { symbol: 'C_ch', meaning: 'channel part of the gate capacitance per width', unit: 'F/m', source: EKV },
  (L, C_ox, c_gs, c_gb) => L * C_ox * (c_gs + c_gb),
)

/** C_gg = C_ch + C_ext, per width. C_ch [F/m], C_ext [F/m] → [F/m]. */
export const gateCapacitance = formula(
  {
    symbol: 'C_gg',
    meaning: 'gate capacitance per width of the intrinsic device',
    unit: 'F/m',
    source: 'definition',
  },
  (C_ch, C_ext) => C_ch + C_ext,
)

/** C_eff = C_gg + C_lay, per width. C_gg [F/m], C_lay [F/m] → [F/m]. */
export const laidOutCapacitance = formula(
  { symbol: 'C_eff', meaning: 'gate capacitance per width as laid out', unit: 'F/m', source: 'definition' },
  (C_gg, C_lay) => C_gg + C_lay,
)

/** f_T,int = g_m/(2π C_gg). g_m [S/m], C_gg [F/m] → [Hz]. */
export const intrinsicTransitFrequency = formula(
  {
    symbol: 'f_T_int',
    meaning: 'transit frequency of the intrinsic device',
    unit: 'Hz',
    source: 'definition',
  },
  (g_m, C_gg) => g_m / (2 * Math.PI * C_gg),
)

/** f_T,eff = g_m/(2π C_eff). g_m [S/m], C_eff [F/m] → [Hz]. */
export const effectiveTransitFrequency = formula(
  { symbol: 'f_T_eff', meaning: 'transit frequency as laid out', unit: 'Hz', source: 'definition' },
  (g_m, C_eff) => g_m / (2 * Math.PI * C_eff),
)

/** Channel f_T = g_mi/(2π C_ch): what the channel alone would do. g_mi [S/m], C_ch [F/m] → [Hz]. */
export const channelTransitFrequency = formula(
  { symbol: 'f_T_ch', meaning: 'transit frequency of the channel alone', unit: 'Hz', source: 'definition' },
  (g_mi, C_ch) => g_mi / (2 * Math.PI * C_ch),
)

/** Complementary stage: f_T = (g_mn + g_mp)/(2π(C_n + C_p)). g_mn [S/m], g_mp [S/m], C_n [F/m], C_p [F/m] → [Hz]. */
export const complementaryTransitFrequency = formula(
  {
    symbol: 'f_T',
    meaning: 'transit frequency of an nMOS and pMOS sharing current',
    unit: 'Hz',
    source: 'derived: capacitances and transconductances in parallel',
  },
  (g_mn, g_mp, C_n, C_p) => (g_mn + g_mp) / (2 * Math.PI * (C_n + C_p)),
)

/** g_m/I_D = g_m/J. g_m [S/m], J [A/m] → [1/V]. */
export const efficiency = formula(
  { symbol: 'gm_ID', meaning: 'transconductance per current', unit: '1/V', source: 'definition' },
  (g_m, J) => g_m / J,
)

/** Self-gain g_m r_o = (g_m/I_D) V_E L. gm_ID [1/V], V_E [V/m], L [m] → [1]. */
export const selfGain = formula(
  {
    symbol: 'A_0',
    meaning: 'self-gain of the transistor',
    unit: '1',
    source: 'definition with the Early voltage V_E L',
  },
  (gm_ID, V_E, L) => gm_ID * V_E * L,
)

/** Transconductance and capacitances per width, with the transit frequencies that follow. SI. */
export interface SpeedHere {
  readonly IC: number
  readonly g_m: number
  readonly C_gg: number
  readonly f_T_int: number
}

/**
 * Transconductance per width of a transistor that carries J.
 *
 * @param device transistor at its operating point
 * @param J current per width [A/m]
 * @param t trace
 * @returns g_m behind the source resistance [S/m]
 */
export function transconductanceAt(device: DeviceHere, J: number, t: Trace): number {
  const { IC, q_s } = chargeAt(device, J, t)
  return transconductanceOf(device, J, IC, q_s, t)
}

function transconductanceOf(device: DeviceHere, J: number, IC: number, q_s: number, t: Trace): number {
  const G = t.calc(normalisedEfficiency, q_s, IC, device.lambda)
  const g_mi = t.calc(intrinsicTransconductance, G, J, device.of.n, device.U_T)
  return t.calc(degeneratedTransconductance, g_mi, device.of.R_s)
}

/** Gate capacitance per width [F/m] of the intrinsic device at source charge q_s [1]. */
export function gateCapacitanceAt(device: DeviceHere, q_s: number, t: Trace): number {
  const c_gs = t.calc(gateSourceShare, q_s)
  const c_gb = t.calc(gateBulkShare, c_gs, device.of.n)
  const C_ch = t.calc(channelCapacitance, device.of.L, device.of.C_ox, c_gs, c_gb)
  return t.calc(gateCapacitance, C_ch, device.of.C_ext)
}

/** Gate capacitance per width [F/m] of the intrinsic device that carries J per width [A/m]. */
export function gateCapacitanceOf(device: DeviceHere, J: number, t: Trace): number {
  return gateCapacitanceAt(device, chargeAt(device, J, t).q_s, t)
}

/**
 * Speed of a transistor that carries J per width.
 *
 * @param device transistor at its operating point
 * @param J current per width [A/m]
 * @param t trace
 * @returns IC [1], g_m [S/m], C_gg [F/m] and the intrinsic f_T [Hz]
 */
export function speedAt(device: DeviceHere, J: number, t: Trace): SpeedHere {
  const { IC, q_s } = chargeAt(device, J, t)
  const g_m = transconductanceOf(device, J, IC, q_s, t)
  const C_gg = gateCapacitanceAt(device, q_s, t)
  return { IC, g_m, C_gg, f_T_int: t.calc(intrinsicTransitFrequency, g_m, C_gg) }
}

/** f_T as laid out [Hz] from the speed of the intrinsic device. */
export function effectiveSpeed(device: DeviceHere, speed: SpeedHere, t: Trace): number {
  const C_eff = t.calc(laidOutCapacitance, speed.C_gg, device.of.C_lay)
  return t.calc(effectiveTransitFrequency, speed.g_m, C_eff)
}

/** Channel f_T [Hz] at current per width J [A/m]: source resistance, overlap and layout left out. */
export function channelSpeed(device: DeviceHere, J: number, t: Trace): number {
  const { IC, q_s } = chargeAt(device, J, t)
  const G = t.calc(normalisedEfficiency, q_s, IC, device.lambda)
  const g_mi = t.calc(intrinsicTransconductance, G, J, device.of.n, device.U_T)
  const c_gs = t.calc(gateSourceShare, q_s)
  const c_gb = t.calc(gateBulkShare, c_gs, device.of.n)
  const C_ch = t.calc(channelCapacitance, device.of.L, device.of.C_ox, c_gs, c_gb)
  return t.calc(channelTransitFrequency, g_mi, C_ch)
}

/** f_T of an nMOS and a pMOS of equal width carrying the same current, intrinsic or as laid out [Hz]. */
export function complementarySpeed(
  nmos: DeviceHere,
  pmos: DeviceHere,
  J_n: number,
  J_p: number,
  laidOut: boolean,
  t: Trace,
): number {
  const n = speedAt(nmos, J_n, t)
  const p = speedAt(pmos, J_p, t)
  const C_n = laidOut ? t.calc(laidOutCapacitance, n.C_gg, nmos.of.C_lay) : n.C_gg
  const C_p = laidOut ? t.calc(laidOutCapacitance, p.C_gg, pmos.of.C_lay) : p.C_gg
  return t.calc(complementaryTransitFrequency, n.g_m, p.g_m, C_n, C_p)
}
