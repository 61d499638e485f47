import { formula } from '../../derivation/formula.ts'

/** Random jitter, delay and load of the buffers of a clock path. */

const CHAIN =
  'derived: time-varying noise integral over a self-consistent chain of current-mode stages; 4 to 17 % high for A ≤ 2'

/** l = distance over n. l_ck [m], n_buf [1] → [m]. */
export const spanLength = formula(
  { symbol: 'l_each', meaning: 'length that each buffer drives', unit: 'm', source: 'definition' },
  (l_ck, n_buf) => l_ck / n_buf,
)

/** n = max(1, ⌈l_ck/l_span⌉). l_ck [m], l_span [m] → [1]. */
export const bufferCount = formula(
  { symbol: 'n_buf', meaning: 'buffers of the distribution', unit: '1', source: 'definition' },
  (l_ck, l_span) => Math.max(1, Math.ceil(l_ck / l_span - 1e-9)),
)

/** C_L = c_wire l_each + φ C_in. c_wire [F/m], l_each [m], phi [1], C_in [F] → [F]. */
export const bufferLoad = formula(
  {
    symbol: 'C_L',
    meaning: 'load of a buffer: its wire and its receivers',
    unit: 'F',
    source: 'definition',
  },
  (c_wire, l_each, phi, C_in) => c_wire * l_each + phi * C_in,
)

/** f_p = (1 + guard) 1.2 f_ck/√(A² − 1). f_ck [Hz], A [1], guard [1] → [Hz]. */
export const bufferPole = formula(
  {
    symbol: 'f_p',
    meaning: 'bandwidth that the buffers are designed for',
    unit: 'Hz',
    source: 'derived: gain at the clock frequency, as the speed check of the buffers asks',
  },
  (f_ck, A, guard) => ((1 + guard) * 1.2 * f_ck) / Math.sqrt(A ** 2 - 1),
)

/** σ = √(2 k_B T (1 + γA)/C_L)/(2πf_p V_sw (1 − 1/A²)): limiting stage. k_B [J/K], T [K], gamma [1], A [1], C_L [F], f_p [Hz], V_sw [V] → [s]. */
export const limitingJitter = formula(
  {
    symbol: 'sigma_lim',
    meaning: 'random jitter of a limiting buffer, rms',
    unit: 's',
    source: CHAIN,
  },
  (k_B, T, gamma, A, C_L, f_p, V_sw) =>
    Math.sqrt((2 * k_B * T * (1 + gamma * A)) / C_L) / (2 * Math.PI * f_p * V_sw * (1 - 1 / A ** 2)),
)

/** V_pk = (4/π) V_sw/√(1 + (f_ck/f_p)²): fundamental of a limited clock behind the pole. V_sw [V], f_ck [Hz], f_p [Hz] → [V]. */
export const sinePeak = formula(
  {
    symbol: 'V_pk',
    meaning: 'differential peak of a near-sinusoidal clock',
    unit: 'V',
    source: 'circuit theory',
  },
  (V_sw, f_ck, f_p) => ((4 / Math.PI) * V_sw) / Math.sqrt(1 + (f_ck / f_p) ** 2),
)

/** σ = √(2 k_B T (1 + γA)/C_L)/(2πf_ck V_pk): near-sinusoidal clock. k_B [J/K], T [K], gamma [1], A [1], C_L [F], f_ck [Hz], V_pk [V] → [s]. */
export const sineJitter = formula(
  {
    symbol: 'sigma_sin',
    meaning: 'random jitter of a near-sinusoidal buffer, rms',
    unit: 's',
    source: 'derived: noise over the slope at the crossing',
  },
  (k_B, T, gamma, A, C_L, f_ck, V_pk) =>
    Math.sqrt((2 * k_B * T * (1 + gamma * A)) / C_L) / (2 * Math.PI * f_ck * V_pk),
)

/** The larger of both forms. sigma_lim [s], sigma_sin [s] → [s]. */
export const bufferJitter = formula(
  {
    symbol: 'sigma_buf',
    meaning: 'random jitter of one buffer, rms',
    unit: 's',
    source: 'method of this planner: the larger of the two forms',
  },
  (sigma_lim, sigma_sin) => Math.max(sigma_lim, sigma_sin),
)

/** σ = √n σ_buf: stages add in square. n_path [1], sigma_buf [s] → [s]. */
export const pathJitter = formula(
  {
    symbol: 'sigma_ck',
    meaning: 'random jitter of the clock path, rms',
    unit: 's',
    source: 'law: independent errors add in square',
  },
  (n_path, sigma_buf) => Math.sqrt(n_path) * sigma_buf,
)

/** n = n_buf + n_div. n_buf [1], n_div [1] → [1]. */
export const pathStages = formula(
  { symbol: 'n_path', meaning: 'stages of the clock path', unit: '1', source: 'definition' },
  (n_buf, n_div) => n_buf + n_div,
)

/** t = ln 2/(2πf_p). f_p [Hz] → [s]. */
export const bufferDelay = formula(
  { symbol: 't_d', meaning: 'delay of a current-mode buffer', unit: 's', source: 'circuit theory' },
  (f_p) => Math.log(2) / (2 * Math.PI * f_p),
)

/** t = n_g FO4: a repeater is two gates. n_g [1], FO4_here [s] → [s]. */
export const repeaterDelay = formula(
  { symbol: 't_d', meaning: 'delay of a full-swing repeater', unit: 's', source: 'definition' },
  (n_g, FO4_here) => n_g * FO4_here,
)

/** I = 2πf_p C_L V_sw/β. f_p [Hz], C_L [F], V_sw [V], beta [1] → [A]. */
export const bufferCurrent = formula(
  {
    symbol: 'I_buf',
    meaning: 'tail current of a clock buffer',
    unit: 'A',
    source: 'derived: I R is the swing and 1/(2πRC) the pole',
  },
  (f_p, C_L, V_sw, beta) => (2 * Math.PI * f_p * C_L * V_sw) / beta,
)

export const RECEIVER_LOAD = {
  symbol: 'C_in',
  meaning: 'input capacitance of each receiver of the clock',
  unit: 'F',
  source: 'common practice, no source',
  value: 10e-15,
}
export const REPEATER_GATES = {
  symbol: 'n_g',
  meaning: 'gates of a full-swing repeater',
  unit: '1',
  source: 'definition',
  value: 2,
}
export const PHASE_DIVIDER = {
  symbol: 'n_div',
  meaning: 'stages of the divider that makes the phases',
  unit: '1',
  source: 'definition',
  path: 'clock.phases_from',
}
