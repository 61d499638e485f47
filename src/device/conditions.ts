import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import type { DeviceValues, NodeValues } from '../nodes/keys.ts'

/** Boltzmann constant and elementary charge, exact. Source: SI 2019 (BIPM SI Brochure, 9th edition). */
export const BOLTZMANN = {
  symbol: 'k_B',
  meaning: 'Boltzmann constant',
  unit: 'J/K',
  source: 'SI 2019, exact',
  value: 1.380649e-23,
}
export const CHARGE = {
  symbol: 'q_e',
  meaning: 'elementary charge',
  unit: 'C',
  source: 'SI 2019, exact',
  value: 1.602176634e-19,
}

const EKV =
  'C. Enz, F. Chicco, A. Pezzotta, Nanoscale MOSFET modeling, IEEE Solid-State Circuits Magazine 9(3) and 9(4), 2017'
const COMMON = 'common practice, no source'

/** U_T = k_B T/q_e. k_B [J/K], T [K], q_e [C] → [V]. Range T > 0. */
export const thermalVoltage = formula(
  { symbol: 'U_T', meaning: 'thermal voltage', unit: 'V', source: 'definition' },
  (k_B, T, q_e) => (k_B * T) / q_e,
)

/** µ = c_mu µ0 (T/300 K)^−1.3. mu0 [m²/(V s)], c_mu [1] corner factor, T [K] → [m²/(V s)]. */
export const mobility = formula(
  { symbol: 'mu', meaning: 'mobility at corner and temperature', unit: 'm^2/(V*s)', source: COMMON },
  (mu0, c_mu, T) => mu0 * c_mu * (T / 300) ** -1.3,
)

/** v_sat(T) = v_sat (T/300 K)^−0.5. v_sat [m/s] at 300 K, T [K] → [m/s]. */
export const saturationVelocity = formula(
  { symbol: 'v_T', meaning: 'saturation velocity at temperature', unit: 'm/s', source: COMMON },
  (v_sat, T) => v_sat * (T / 300) ** -0.5,
)

/** V_T = V_T0 + dV_T + dV_age − 0.7 mV/K (T − 300 K). V_T0 [V], dV_T [V] corner, dV_age [V] ageing, T [K] → [V]. */
export const threshold = formula(
  { symbol: 'V_T', meaning: 'threshold voltage at corner and temperature', unit: 'V', source: COMMON },
  (V_T0, dV_T, dV_age, T) => V_T0 + dV_T + dV_age - 0.0007 * (T - 300),
)

/** I_spec□ = 2 n µ C_ox U_T². n [1], mu [m²/(V s)], C_ox [F/m²], U_T [V] → [A]. */
export const specificCurrent = formula(
  { symbol: 'I_spec', meaning: 'specific current of a square', unit: 'A', source: EKV },
  (n, mu, C_ox, U_T) => 2 * n * mu * C_ox * U_T ** 2,
)

/** λ = 2 µ U_T/(v_T L). mu [m²/(V s)], U_T [V], v_T [m/s], L [m] → [1]; 0 is a long channel. */
export const velocitySaturation = formula(
  { symbol: 'lambda', meaning: 'velocity-saturation parameter', unit: '1', source: EKV },
  (mu, U_T, v_T, L) => (2 * mu * U_T) / (v_T * L),
)

/** J_lim = J_max, and 0.7 J_max above 105 °C. J_max [A/m], T [K] → [A/m]. */
export const admissibleDensity = formula(
  {
    symbol: 'J_lim',
    meaning: 'largest admissible current per width (electromigration above 105 °C)',
    unit: 'A/m',
    source: COMMON,
  },
  (J_max, T) => (T > 378.15 ? 0.7 * J_max : J_max),
)

/** Process corner, junction temperature and lowest supplies at which a check is judged. SI. */
export interface OperatingPoint {
  readonly corner: 'slow' | 'typical' | 'fast'
  readonly T: number
  /** Mobility factor and threshold shift of the corner. */
  readonly c_mu: number
  readonly dV_T: number
  readonly dV_age: number
  /** Supply tolerance taken at this point: the stated one, or 0 at the typical point. */
  readonly tol_V: number
}

/** One transistor at one operating point: everything that does not depend on its current. SI. */
export interface DeviceHere {
  readonly of: DeviceValues
  readonly U_T: number
  readonly mu: number
  readonly V_T: number
  readonly I_spec: number
  readonly lambda: number
  /** Largest admissible current per width, A/m. */
  readonly J_lim: number
}

/**
 * A transistor at an operating point.
 *
 * @param device its values at 300 K, typical [SI]
 * @param at corner, temperature [K], threshold shifts [V]
 * @param t where the steps are written down
 * @returns thermal voltage [V], mobility, threshold [V], specific current [A], λ [1], density limit [A/m]
 */
export function deviceAt(device: DeviceValues, at: OperatingPoint, t: Trace): DeviceHere {
  const U_T = t.calc(thermalVoltage, BOLTZMANN.value, at.T, CHARGE.value)
  const mu = t.calc(mobility, device.mu0, at.c_mu, at.T)
  const v_T = t.calc(saturationVelocity, device.v_sat, at.T)
  return {
    of: device,
    U_T,
    mu,
    V_T: t.calc(threshold, device.V_T0, at.dV_T, at.dV_age, at.T),
    I_spec: t.calc(specificCurrent, device.n, mu, device.C_ox, U_T),
    lambda: t.calc(velocitySaturation, mu, U_T, v_T, device.L),
    J_lim: t.calc(admissibleDensity, device.J_max, at.T),
  }
}

/** The typical corner at a temperature [K], nominal supply, no ageing. */
export function typicalPoint(T: number): OperatingPoint {
  return { corner: 'typical', T, c_mu: 1, dV_T: 0, dV_age: 0, tol_V: 0 }
}

/** A corner of a node at a temperature [K] with its lowest supply; ageing [V] counts at the slow corner. */
export function cornerPoint(
  node: NodeValues,
  corner: OperatingPoint['corner'],
  T: number,
  tolerance: number,
  ageing: number,
): OperatingPoint {
  const shifts = corner === 'typical' ? { mu_factor: 1, V_T_shift: 0 } : node.corners[corner]
  return {
    corner,
    T,
    c_mu: shifts.mu_factor,
    dV_T: shifts.V_T_shift,
    dV_age: corner === 'slow' ? ageing : 0,
    tol_V: tolerance,
  }
}
