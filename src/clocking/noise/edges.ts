import { formula } from '../../derivation/formula.ts'

/** Jitter of full-swing gates, and the phase-noise floor that sampling it once a period makes. */

const GATE =
  'A. A. Abidi, IEEE JSSC 41(8), 2006, rearranged for a gate that drives C_L to half the supply in its delay'

/** V_ov = max(V_core − V_T, 2 n U_T): weak inversion bounds what current costs in noise. V_core [V], V_T [V], n [1], U_T [V] → [V]. */
export const gateOverdrive = formula(
  { symbol: 'V_ov', meaning: 'overdrive of a gate', unit: 'V', source: 'circuit theory' },
  (V_core, V_T, n, U_T) => Math.max(V_core - V_T, 2 * n * U_T),
)

/** σ = (2 t_g/V) √(k_B T (1 + 2γV/V_ov)/C_L). t_g [s], V_core [V], k_B [J/K], T [K], gamma [1], V_ov [V], C_L [F] → [s]. */
export const gateJitter = formula(
  { symbol: 'sigma_g', meaning: 'random jitter of one gate, rms', unit: 's', source: GATE },
  (t_g, V_core, k_B, T, gamma, V_ov, C_L) =>
    ((2 * t_g) / V_core) * Math.sqrt((k_B * T * (1 + (2 * gamma * V_core) / V_ov)) / C_L),
)

/** A = n_g (2πf_ref σ_g)² N²/f_ref: white in every period, so its floor is spread over the sampling frequency. n_g [1], f_ref [Hz], sigma_g [s], N [1] → [1/Hz]. */
export const gateFloor = formula(
  {
    symbol: 'A_g',
    meaning: 'density that gates at the reference frequency add at the output',
    unit: '1/Hz',
    source: 'derived: independent errors once a period',
  },
  (n_g, f_ref, sigma_g, N) => (n_g * (2 * Math.PI * f_ref * sigma_g) ** 2 * N ** 2) / f_ref,
)

export const GATE_LOAD = {
  symbol: 'C_L',
  meaning: 'load of a gate in the path of the reference',
  unit: 'F',
  source: 'common practice, no source',
  value: 10e-15,
}
export const RETIMING = {
  symbol: 'n_g',
  meaning: 'gates of the stage that retimes the divider',
  unit: '1',
  source: 'common practice, no source',
  value: 2,
}
