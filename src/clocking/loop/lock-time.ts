import { formula } from '../../derivation/formula.ts'

const POLES = 'derived: poles of the third-order loop at −1 and at the roots of s² + (√b − 1)s + 1, times ω_c'

/** Real part of the slowest pole over ω_c: d − √(d² − 1) with d = (√b − 1)/2, or d where the pair is complex. r_b [1] = √b → [1]. */
export const slowestPole = formula(
  { symbol: 'p_slow', meaning: 'slowest pole of the loop over its bandwidth', unit: '1', source: POLES },
  (r_b) => (r_b - 1) / 2 - Math.sqrt(Math.max(0, ((r_b - 1) / 2) ** 2 - 1)),
)

/** Δf = K_V V_tune/2: what the search among the bands leaves. K_V [Hz/V], V_tune [V] → [Hz]. */
export const frequencyError = formula(
  {
    symbol: 'df_0',
    meaning: 'frequency error that the loop itself must remove',
    unit: 'Hz',
    source: 'definition: half the span of the tuning voltage',
  },
  (K_V, V_tune) => (K_V * V_tune) / 2,
)

/** t = n_count ⌈log2((f_max − f_min)/(K_V V_tune))⌉/f_ref: a binary search among bands. n_count [1], f_min [Hz], f_max [Hz], K_V [Hz/V], V_tune [V], f_ref [Hz] → [s]. */
export const searchTime = formula(
  {
    symbol: 't_search',
    meaning: 'time to find the band',
    unit: 's',
    source: 'derived: one count of the reference a step of a binary search',
  },
  (n_count, f_min, f_max, K_V, V_tune, f_ref) =>
    (n_count * Math.max(0, Math.ceil(Math.log2((f_max - f_min) / (K_V * V_tune))))) / f_ref,
)

/** t = 2 Δf (C1 + C2)/(I_CP K_V): half the current while cycles slip. df_0 [Hz], C_sum [F], I_CP [A], K_V [Hz/V] → [s]. */
export const slewTime = formula(
  {
    symbol: 't_slew',
    meaning: 'time in which the charge pump charges the filter',
    unit: 's',
    source: 'derived: on average half the current flows while cycles slip',
  },
  (df_0, C_sum, I_CP, K_V) => (2 * df_0 * C_sum) / (I_CP * K_V),
)

/** t = ln(max(1, Δf/(tol_f f_0)))/(2πf_c p_slow). df_0 [Hz], tol_f [1], f_0 [Hz], f_c [Hz], p_slow [1] → [s]. */
export const settlingTime = formula(
  { symbol: 't_settle', meaning: 'time to settle to the tolerance', unit: 's', source: POLES },
  (df_0, tol_f, f_0, f_c, p_slow) =>
    Math.log(Math.max(1, df_0 / (tol_f * f_0))) / (2 * Math.PI * f_c * p_slow),
)

/** t_lock = t_search + t_slew + t_settle. t_search [s], t_slew [s], t_settle [s] → [s]. */
export const lockTime = formula(
  { symbol: 't_lock', meaning: 'time to lock', unit: 's', source: 'definition' },
  (t_search, t_slew, t_settle) => t_search + t_slew + t_settle,
)

/** t_lock of a realigned oscillator: search, then one pole at its bandwidth. t_search [s], t_settle [s] → [s]. */
export const realignedLockTime = formula(
  { symbol: 't_lock', meaning: 'time to lock', unit: 's', source: 'definition' },
  (t_search, t_settle) => t_search + t_settle,
)

export const COUNT = {
  symbol: 'n_count',
  meaning: 'reference periods that one step of the search counts',
  unit: '1',
  source: 'common practice, no source',
  value: 64,
}
export const FIRST_ORDER = {
  symbol: 'p_slow',
  meaning: 'pole of a loop of first order over its bandwidth',
  unit: '1',
  source: 'definition',
  value: 1,
}
