import { formula } from '../derivation/formula.ts'
import { marginAtLeast } from '../derivation/margin.ts'
import type { Trace } from '../derivation/trace.ts'
import type { DeviceHere } from '../device/conditions.ts'
import { efficiency, transconductanceAt } from '../device/speed.ts'
import type { Bench } from './bench.ts'
import { largestFixedShare, lowEndQuality, reachableRatio, type Tank, tankCapacitance } from './lc-tank.ts'
import type { Stacked } from './stack-checks.ts'
import type { RouteOutcome } from './sub-block.ts'

/** Start-up of an LC oscillator: what its pair must give, what that pair weighs on the tank. */

const DERIVED = 'derived: start-up is set at the low end, its capacitance is charged at the high end'

/** g_m = 2 S/(Q_lo 2πf_lo L_d): each side's transconductance. S [1] loop gain, Q_lo [1], f_lo [Hz], L_d [H] → [S]. */
export const startUpTransconductance = formula(
  {
    symbol: 'g_m_start',
    meaning: 'transconductance of each side that starts the oscillator at its low end',
    unit: 'S',
    source: 'derived: the conductance g_m/2 of a cross-coupled pair is S times 1/R_p',
  },
  (S, Q_lo, f_lo, L_d) => (2 * S) / (Q_lo * 2 * Math.PI * f_lo * L_d),
)

/** κ = (1 − m)/2 + 2m + (d − m)/2: differential capacitance of the pair over one side's C_eff. m [1], d [1] drain share, C_gd included → [1]. */
export const pairCapacitance = formula(
  {
    symbol: 'kappa',
    meaning: 'differential capacitance of the pair over the gate capacitance of one side',
    unit: '1',
    source: 'derived: gate–source and drain–bulk halve, each gate–drain counts twice across the tank',
  },
  (m, d) => (1 - m) / 2 + 2 * m + (d - m) / 2,
)

/** s_dev,max = s_f,max − s_0. s_f_max [1], s_0 [1] → [1]. */
export const allowedDeviceShare = formula(
  {
    symbol: 's_dev_max',
    meaning: 'largest share of the tank capacitance that the pair may take',
    unit: '1',
    source: DERIVED,
  },
  (s_f_max, s_0) => s_f_max - s_0,
)

/** f_T = κ g_m/(2π s_dev C_t): the pair just fits. kappa [1], g_m_start [S], s_dev_max [1], C_t [F] → [Hz]. */
export const oscillatorDemand = formula(
  { symbol: 'f_T_req', meaning: 'device speed that the oscillator needs', unit: 'Hz', source: DERIVED },
  (kappa, g_m_start, s_dev_max, C_t) => (kappa * g_m_start) / (2 * Math.PI * s_dev_max * C_t),
)

/** a = 2 S κ (f_max/f_T) x: share of the pair times the quality factor. S [1], kappa [1], f_max [Hz], f_T_eff [Hz], x [1] → [1]. */
export const pairWeight = formula(
  { symbol: 'a_dev', meaning: 'share of the pair times Q at the low end', unit: '1', source: DERIVED },
  (S, kappa, f_max, f_T_eff, x) => (2 * S * kappa * f_max * x) / f_T_eff,
)

/** s_f = s_0 + a/Q_t for a stated quality factor. s_0 [1], a_dev [1], Q_t [1] → [1]. */
export const fixedShareStatedQ = formula(
  { symbol: 's_f', meaning: 'fixed share of the tank capacitance', unit: '1', source: DERIVED },
  (s_0, a_dev, Q_t) => s_0 + a_dev / Q_t,
)

/** s_f = s_0 + a/Q_lo(s_f), solved: Q_lo depends on s_f linearly in 1/Q. s_0 [1], a_dev [1], x [1], Q_L [1], Q_b [1] → [1]. */
export const fixedShareOfTank = formula(
  { symbol: 's_f', meaning: 'fixed share of the tank capacitance', unit: '1', source: DERIVED },
  (s_0, a_dev, x, Q_L, Q_b) => (s_0 + a_dev * (x / Q_L + 1 / (Q_b * x))) / (1 + a_dev / (x ** 3 * Q_b)),
)

/** S = (g_m/I_D)(I/2) R_p/2: loop gain from a stated current. gm_ID [1/V] of one side, I_osc [A], Q_lo [1], f_lo [Hz], L_d [H] → [1]. */
export const loopGainOfCurrent = formula(
  { symbol: 'S_av', meaning: 'loop gain at the low end', unit: '1', source: 'circuit theory' },
  (gm_ID, I_osc, Q_lo, f_lo, L_d) => (gm_ID * (I_osc / 2) * Q_lo * 2 * Math.PI * f_lo * L_d) / 2,
)

/** S = s_dev C_t 2πf_T Q_lo 2πf_lo L_d/(2 κ): loop gain of the widest pair that fits. s_dev_max [1], C_t [F], f_T_eff [Hz], Q_lo [1], f_lo [Hz], L_d [H], kappa [1] → [1]. */
export const loopGainOfShare = formula(
  {
    symbol: 'S_av',
    meaning: 'loop gain at the low end of the widest pair that fits',
    unit: '1',
    source: DERIVED,
  },
  (s_dev_max, C_t, f_T_eff, Q_lo, f_lo, L_d, kappa) =>
    (s_dev_max * C_t * 2 * Math.PI * f_T_eff * Q_lo * 2 * Math.PI * f_lo * L_d) / (2 * kappa),
)

/** gm/I of both devices of a side. gm_ID_n [1/V], gm_ID_p [1/V] → [1/V]. */
export const sharedEfficiency = formula(
  {
    symbol: 'gm_ID',
    meaning: 'transconductance per current of nMOS and pMOS sharing it',
    unit: '1/V',
    source: 'circuit theory',
  },
  (gm_ID_n, gm_ID_p) => gm_ID_n + gm_ID_p,
)

/** The pair that the tank's range leaves room for. SI. */
export interface Demand {
  /** Differential capacitance of the pair over one side's C_eff. */
  readonly kappa: number
  /** Quality factor at the low end, at the largest fixed share that the range allows. */
  readonly Q_lo: number
  readonly g_m: number
  readonly C_t: number
  /** Room for the pair and the speed it then needs; null when the range leaves no room at any speed. */
  readonly room: { readonly s_dev: number; readonly f_T: number } | null
}

/** An LC oscillator at an operating point. SI. */
export interface LcOscillator extends Stacked {
  readonly tank: Tank
  readonly demand: Demand
  readonly nmos: DeviceHere
  /** Present in a complementary oscillator. */
  readonly pmos: DeviceHere | null
}

/** What the tank asks of its pair. At the boundary the fixed share is known, so no search is needed. */
export function demandOf(tank: Tank, bench: Bench): Demand {
  const { t, node } = bench
  const { oscillator, f_max, f_lo, L_d, rho, K, s_0 } = tank
  const kappa = t.calc(pairCapacitance, node.shares.m, node.shares.d)
  const C_t = t.calc(tankCapacitance, f_max, L_d)
  const s_f = rho > 1 ? t.calc(largestFixedShare, rho, K) : Number.NEGATIVE_INFINITY
  const fits = s_f > s_0
  const Q_lo = lowEndQuality(tank, fits ? s_f : s_0, t)
  const g_m = t.calc(startUpTransconductance, oscillator.startup_gain, Q_lo, f_lo, L_d)
  if (!fits) return { kappa, Q_lo, g_m, C_t, room: null }
  const s_dev = t.calc(allowedDeviceShare, s_f, s_0)
  return { kappa, Q_lo, g_m, C_t, room: { s_dev, f_T: t.calc(oscillatorDemand, kappa, g_m, s_dev, C_t) } }
}

/** Fixed share of the tank [1] with the pair that starts it, built from devices of f_T [Hz]. */
export function fixedShareAt(tank: Tank, kappa: number, f_T: number, t: Trace): number {
  const { oscillator, f_max, x, s_0, Q_L } = tank
  const a_dev = t.calc(pairWeight, oscillator.startup_gain, kappa, f_max, f_T, x)
  return oscillator.tank_q === null
    ? t.calc(fixedShareOfTank, s_0, a_dev, x, Q_L, oscillator.bank_q)
    : t.calc(fixedShareStatedQ, s_0, a_dev, oscillator.tank_q)
}

/** No device speed gives the range: judged by the capacitance ratio that an infinitely fast pair would reach. */
export function noRoom(tank: Tank, t: Trace): RouteOutcome & { readonly margin: number } {
  const { rho, K, s_0 } = tank
  const reached = t.calc(reachableRatio, s_0, rho)
  const limiting =
    rho <= K
      ? `the bank's on/off capacitance ratio ${rho.toFixed(2)} is below the ${K.toFixed(2)} that the range needs`
      : `buffers and wiring hold ${(100 * s_0).toFixed(0)} % of the tank, so it reaches a capacitance ratio of ${reached.toFixed(2)} of the ${K.toFixed(2)} needed`
  return {
    required: null,
    available: null,
    margin: t.calc(marginAtLeast, reached, K),
    reason: `no device speed suffices: ${limiting}`,
  }
}

/** Transconductance per current [1/V] of one side of the pair at current per width J [A/m]. */
export function sideEfficiency(nmos: DeviceHere, pmos: DeviceHere | null, J: number, t: Trace): number {
  const ofNmos = t.calc(efficiency, transconductanceAt(nmos, J, t), J)
  if (pmos === null) return ofNmos
  return t.calc(sharedEfficiency, ofNmos, t.calc(efficiency, transconductanceAt(pmos, J, t), J))
}
