import { formula } from '../../derivation/formula.ts'

/** Phase noise of an LC oscillator, as densities at its own frequency. */

const LEESON =
  'D. B. Leeson, Proc. IEEE 54, 1966, in the form of T. H. Lee, A. Hajimiri, IEEE JSSC 35(3), 2000: single sideband, P_s the power in the tank'
const TAIL =
  'derived: a hard-switched pair samples the tail current; white noise of the tail at every even harmonic'

/** g_m,tail = 2 I/V_tail: a tail at the edge of saturation. I_osc [A], V_tail [V] → [S]. */
export const tailTransconductance = formula(
  {
    symbol: 'g_m_tail',
    meaning: 'transconductance of the tail source',
    unit: 'S',
    source: 'derived: strong inversion with the overdrive that the tail is given',
  },
  (I_osc, V_tail) => (2 * I_osc) / V_tail,
)

/** F = 1 + γ + k_tail γ g_m,tail R_p/4: nMOS pair, the tail current reaches the tank by halves. gamma [1], k_tail [1], g_m_tail [S], R_p [Ω] → [1]. */
export const noiseFactor = formula(
  { symbol: 'F', meaning: 'noise factor: tank, pair and tail', unit: '1', source: TAIL },
  (gamma, k_tail, g_m_tail, R_p) => 1 + gamma + (k_tail * gamma * g_m_tail * R_p) / 4,
)

/** F = 1 + γ + k_tail γ g_m,tail R_p: complementary pairs, all of the tail current reverses. gamma [1], k_tail [1], g_m_tail [S], R_p [Ω] → [1]. */
export const complementaryNoiseFactor = formula(
  { symbol: 'F', meaning: 'noise factor: tank, pairs and tail', unit: '1', source: TAIL },
  (gamma, k_tail, g_m_tail, R_p) => 1 + gamma + k_tail * gamma * g_m_tail * R_p,
)

/** F = 1 + γ without a tail source. gamma [1] → [1]. */
export const taillessNoiseFactor = formula(
  {
    symbol: 'F',
    meaning: 'noise factor: tank and pair',
    unit: '1',
    source: 'T. H. Lee, A. Hajimiri, IEEE JSSC 35(3), 2000',
  },
  (gamma) => 1 + gamma,
)

/** γ = (γ_n + γ_p)/2: both pairs share the noise. gamma_n [1], gamma_p [1] → [1]. */
export const meanNoise = formula(
  {
    symbol: 'gamma',
    meaning: 'noise coefficient of complementary pairs',
    unit: '1',
    source: 'circuit theory',
  },
  (gamma_n, gamma_p) => (gamma_n + gamma_p) / 2,
)

/** P_s = V0²/(2 R_p). V0 [V], R_p [Ω] → [W]. */
export const tankPower = formula(
  { symbol: 'P_s', meaning: 'power in the tank', unit: 'W', source: 'circuit theory' },
  (V0, R_p) => V0 ** 2 / (2 * R_p),
)

/** h_0 = 2 F k_B T/P_s: far from the carrier. F [1], k_B [J/K], T [K], P_s [W] → [1/Hz]. */
export const farNoise = formula(
  { symbol: 'h_0', meaning: 'density far from the carrier', unit: '1/Hz', source: LEESON },
  (F, k_B, T, P_s) => (2 * F * k_B * T) / P_s,
)

/** h_2 = h_0 (f_0/(2 Q_t))²: density times the square of the offset. h_0 [1/Hz], f_0 [Hz], Q_t [1] → [Hz]. */
export const tankNoise = formula(
  {
    symbol: 'h_2',
    meaning: 'density times the square of the offset, near the carrier',
    unit: 'Hz',
    source: LEESON,
  },
  (h_0, f_0, Q_t) => h_0 * (f_0 / (2 * Q_t)) ** 2,
)

/** h_2 ≥ (1 + γ) k_B T f_0²/(2 η P Q_t²), η = 2/π: what no oscillator of this power beats. gamma [1], k_B [J/K], T [K], f_0 [Hz], P_osc [W], Q_t [1] → [Hz]. */
export const leastTankNoise = formula(
  {
    symbol: 'h_2_least',
    meaning: 'least density times the square of the offset at this power and quality factor',
    unit: 'Hz',
    source: 'M. Garampazzi et al., IEEE JSSC 49(3), 2014, for square-wave currents',
  },
  (gamma, k_B, T, f_0, P_osc, Q_t) =>
    ((1 + gamma) * k_B * T * f_0 ** 2) / (2 * (2 / Math.PI) * P_osc * Q_t ** 2),
)

/** The larger of both. h_2 [Hz], h_2_least [Hz] → [Hz]. */
export const credibleNoise = formula(
  {
    symbol: 'h_2',
    meaning: 'density times the square of the offset, never below the published ceiling',
    unit: 'Hz',
    source: 'method of this planner',
  },
  (h_2, h_2_least) => Math.max(h_2, h_2_least),
)

/** P = V I. V [V], I_osc [A] → [W]. */
export const oscillatorPower = formula(
  { symbol: 'P_osc', meaning: 'power of the oscillator core', unit: 'W', source: 'definition' },
  (V, I_osc) => V * I_osc,
)

/** f_fl by kind of transistor. */
export const flickerCornerOf = (kind: 'planar' | 'thin-body' | 'fin' | 'sheet') => ({
  symbol: 'f_fl',
  meaning: `offset below which flicker noise rules an LC oscillator of ${kind} transistors`,
  unit: 'Hz',
  source: 'common practice, no source',
  value: kind === 'fin' || kind === 'sheet' ? 2e6 : 0.2e6,
})

/** Inverse of Leeson's form for checks by hand: L = 10 log10{h_0 B_1 [1 + (f_0/(2 Q_t Δf))²](1 + f_fl/Δf)}. h_0 [1/Hz], B_1 [Hz], f_0 [Hz], Q_t [1], df [Hz], f_fl [Hz] → [dBc/Hz]. */
export const phaseNoiseAt = formula(
  { symbol: 'L', meaning: 'phase noise at an offset', unit: 'dBc/Hz', source: LEESON },
  (h_0, B_1, f_0, Q_t, df, f_fl) =>
    10 * Math.log10(h_0 * B_1 * (1 + (f_0 / (2 * Q_t * df)) ** 2) * (1 + f_fl / df)),
)
