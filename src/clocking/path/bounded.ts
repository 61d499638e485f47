import { formula } from '../../derivation/formula.ts'

/** Bounded jitter of the clock path and of the receiver's recovery loop. */

/** J = n t_d S_V ΔV/V. n_path [1], t_d [s], S_V [1], dV_pp [V], V [V] → [s]. */
export const supplyJitter = formula(
  {
    symbol: 'J_supply',
    meaning: 'jitter that the supply ripple makes along the clock path, peak to peak',
    unit: 's',
    source: 'derived: delay times its relative sensitivity to the supply',
  },
  (n_path, t_d, S_V, dV_pp, V) => (n_path * t_d * S_V * dV_pp) / V,
)

/** J = e_ph T_ck. e_ph [1], T_ck [s] → [s]. */
export const phaseErrorJitter = formula(
  {
    symbol: 'J_eo',
    meaning: 'even-odd jitter of the error between phases, peak to peak',
    unit: 's',
    source: 'definition',
  },
  (e_ph, T_ck) => e_ph * T_ck,
)

/** J = 4 · 10^(S/20)/(2πf_0). S_ref [dBc], f_0 [Hz] → [s]. */
export const spurJitter = formula(
  {
    symbol: 'J_spur',
    meaning: 'jitter of the reference spur, peak to peak',
    unit: 's',
    source: 'derived: two sidebands of S each deviate the phase by 2 · 10^(S/20) each way',
  },
  (S_ref, f_0) => (4 * 10 ** (S_ref / 20)) / (2 * Math.PI * f_0),
)

/** J = (n_hunt + 1) UI/n_step: hunting, and one step of nonlinearity. n_hunt [1], UI [s], n_step [1] → [s]. */
export const recoveryJitter = formula(
  {
    symbol: 'J_rec',
    meaning: 'jitter of the recovered clock: hunting and nonlinearity of its interpolator, peak to peak',
    unit: 's',
    source: 'common practice, no source: nonlinearity of one step',
  },
  (n_hunt, UI, n_step) => ((n_hunt + 1) * UI) / n_step,
)

/** Sensitivity of delay to supply by style. */
export const SENSITIVITY = {
  CML: {
    symbol: 'S_V',
    meaning: 'relative delay over relative supply of current-mode buffers',
    unit: '1',
    source: 'common practice, no source',
    value: 0.15,
  },
  CMOS: {
    symbol: 'S_V',
    meaning: 'relative delay over relative supply of full-swing gates',
    unit: '1',
    source: 'common practice, no source',
    value: 1.2,
  },
  'source-series': {
    symbol: 'S_V',
    meaning: 'relative delay over relative supply of a source-series-terminated driver',
    unit: '1',
    source: 'common practice, no source',
    value: 0.5,
  },
} as const
