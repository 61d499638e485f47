import { formula } from '../../derivation/formula.ts'

/** Phase noise of a ring oscillator. */

/** h_2 = 7.33 (k_B T/P) f_0² 10^(X/10). k_B [J/K], T [K], P_osc [W], f_0 [Hz], X_ring [dB] → [Hz]. */
export const ringNoise = formula(
  {
    symbol: 'h_2',
    meaning: 'density times the square of the offset, near the carrier',
    unit: 'Hz',
    source:
      'R. Navid, T. H. Lee, R. W. Dutton, IEEE JSSC 40(3), 2005: least of a ring, and the excess stated',
  },
  (k_B, T, P_osc, f_0, X_ring) => 7.33 * ((k_B * T) / P_osc) * f_0 ** 2 * 10 ** (X_ring / 10),
)

/** I = N I_stage. N [1], I_stage [A] → [A]. */
export const ringCurrent = formula(
  {
    symbol: 'I_osc',
    meaning: 'current of a ring whose current the scenario leaves open',
    unit: 'A',
    source: 'definition',
  },
  (N, I_stage) => N * I_stage,
)

export const STAGE_CURRENT = {
  symbol: 'I_stage',
  meaning: 'current of each stage of a ring',
  unit: 'A',
  source: 'common practice, no source',
  value: 1e-3,
}

/** Corner of a ring's flicker noise by kind of transistor. */
export const ringCornerOf = (kind: 'planar' | 'thin-body' | 'fin' | 'sheet') => ({
  symbol: 'f_fl',
  meaning: `offset below which flicker noise rules a ring of ${kind} transistors`,
  unit: 'Hz',
  source: 'common practice, no source: several times that of an LC oscillator',
  value: kind === 'fin' || kind === 'sheet' ? 10e6 : 1e6,
})
