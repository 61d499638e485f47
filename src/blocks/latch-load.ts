import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import type { DeviceHere } from '../device/conditions.ts'
import { gateCapacitanceOf, transconductanceAt } from '../device/speed.ts'
import { halfDensity } from '../device/stacks/lines.ts'
import type { NodeValues } from '../nodes/keys.ts'
import { layoutShare } from './load.ts'

/** Current-mode latches: their load, the toggle rate of two in a ring, and whether they regenerate. */

const LATCH = 'derived: two latches in a ring; transient simulation of the latch pair gives 1.2 to 1.6'

/** Width of the cross-coupled pair over that of the data pair. */
export const CROSS_RATIO = {
  symbol: 'rho_x',
  meaning: 'cross-coupled pair over data pair',
  unit: '1',
  source: 'common practice, no source: 0.5 to 0.6',
  value: 0.55,
}
const HALF_CURRENT = {
  symbol: 'x_gm',
  meaning: 'share of the peak transconductance at half the tail current',
  unit: '1',
  source: LATCH,
  value: 0.55,
}
const RETIMING = {
  symbol: 'r_t',
  meaning: 'gain of two clocked latches in a ring over a static stage',
  unit: '1',
  source: LATCH,
  value: 1.2,
}

/** k = 2 x r_t. x_gm [1], r_t [1] → [1]. */
export const latchFactor = formula(
  { symbol: 'k_latch', meaning: 'toggle rate over f_T/ℓ of a latch', unit: '1', source: LATCH },
  (x_gm, r_t) => 2 * x_gm * r_t,
)

/** ℓ = (1 + A m + c_lay) + ρ(1 + 3m + d + c_lay) + d + w + φ_o(1 + A m + c_lay). A [1], m [1], c_lay [1], rho_x [1], d [1], w [1], phi_o [1] → [1]. */
export const latchLoad = formula(
  {
    symbol: 'l_latch',
    meaning: 'load of a latch in gate capacitances of its data pair',
    unit: '1',
    source: 'derived: next latch, own cross pair, drains, wire and output',
  },
  (A, m, c_lay, rho_x, d, w, phi_o) =>
    1 + A * m + c_lay + rho_x * (1 + 3 * m + d + c_lay) + d + w + phi_o * (1 + A * m + c_lay),
)

/** f_T ≥ f_in ℓ/(k β): a ring of two latches divides f_in. f_in [Hz], l_latch [1], k_latch [1], beta [1] → [Hz]. */
export const latchDemand = formula(
  { symbol: 'f_T_req', meaning: 'device speed that the latches need', unit: 'Hz', source: LATCH },
  (f_in, l_latch, k_latch, beta) => (f_in * l_latch) / (k_latch * beta),
)

/** Toggle rate of a latch pair over f_T/ℓ [1], from its two shares. */
export function latchFactorOf(t: Trace): number {
  return t.calc(latchFactor, t.leaf(HALF_CURRENT, HALF_CURRENT.value), t.leaf(RETIMING, RETIMING.value))
}

/** Load ℓ of a latch [1] whose data pair carries J [A/m] per width; A its gain [1], phi_o the output load [1]. */
export function latchLoadAt(
  device: DeviceHere,
  { m, d, w }: NodeValues['shares'],
  A: number,
  phi_o: number,
  J: number,
  t: Trace,
): number {
  const C_gg = gateCapacitanceOf(device, t.calc(halfDensity, J), t)
  const c_lay = t.calc(layoutShare, device.of.C_lay, C_gg)
  return t.calc(latchLoad, A, m, c_lay, t.leaf(CROSS_RATIO, CROSS_RATIO.value), d, w, phi_o)
}

/** J_x = J/(2ρ): each cross device at balance. J [A/m] of the data pair, rho_x [1] → [A/m]. */
export const crossDensity = formula(
  {
    symbol: 'J_x',
    meaning: 'current per width of each cross-coupled device at balance',
    unit: 'A/m',
    source: 'definition',
  },
  (J, rho_x) => J / (2 * rho_x),
)

/** Loop gain ρ g_m(J_x) V_sw/J of the cross pair on its load R = V_sw/(J W). rho_x [1], g_m [S/m], V_sw [V], J [A/m] → [1]. */
export const crossGain = formula(
  {
    symbol: 'A_cross',
    meaning: 'loop gain of the cross-coupled pair at balance',
    unit: '1',
    source: 'derived: g_m of the cross pair times the load R = V_sw/I',
  },
  (rho_x, g_m, V_sw, J) => (rho_x * g_m * V_sw) / J,
)

/** Loop gain [1] of the cross pair of a latch whose data pair carries J [A/m] per width, on a swing V_sw [V]. */
export function crossGainAt(device: DeviceHere, J: number, V_sw: number, t: Trace): number {
  const rho_x = t.leaf(CROSS_RATIO, CROSS_RATIO.value)
  const g_m = transconductanceAt(device, t.calc(crossDensity, J, rho_x), t)
  return t.calc(crossGain, rho_x, g_m, V_sw, J)
}
