import { formula } from '../../derivation/formula.ts'

const SHAPE =
  'C. S. Vaucher, Architectures for RF Frequency Synthesizers, 2002: zero and pole placed for the largest phase margin'

/** √b = (1 + sin φ)/cos φ. phi_m [deg] → [1]. */
export const poleZeroRoot = formula(
  { symbol: 'r_b', meaning: "root of the filter's pole over its zero", unit: '1', source: SHAPE },
  (phi_m) => (1 + Math.sin((phi_m * Math.PI) / 180)) / Math.cos((phi_m * Math.PI) / 180),
)

/** f_lim = f_ref/n_lim. f_ref [Hz], n_lim [1] → [Hz]. */
export const bandwidthLimit = formula(
  {
    symbol: 'f_lim',
    meaning: 'largest bandwidth of a sampled loop',
    unit: 'Hz',
    source: 'F. M. Gardner, IEEE Trans. Commun. 28(11), 1980: a tenth of the reference',
  },
  (f_ref, n_lim) => f_ref / n_lim,
)

/** f_most = f_lim/(1 + guard): the optimum is looked for below. f_lim [Hz], guard [1] → [Hz]. */
export const guardedBandwidth = formula(
  {
    symbol: 'f_most',
    meaning: 'largest bandwidth that keeps the guard',
    unit: 'Hz',
    source: 'method of this planner',
  },
  (f_lim, guard) => f_lim / (1 + guard),
)

/** f_c = 0.27 f_ref. f_ref [Hz], k_re [1] → [Hz]. */
export const realignedBandwidth = formula(
  {
    symbol: 'f_c',
    meaning: 'effective bandwidth of a realigned oscillator',
    unit: 'Hz',
    source: 'derived: an oscillator realigned once a period forgets its phase within a fraction of it',
  },
  (f_ref, k_re) => k_re * f_ref,
)

/** φ = φ_m − φ_T f_c/(2 f_ref): half a reference period of delay. phi_m [deg], f_c [Hz], f_ref [Hz], phi_T [deg] a full turn → [deg]. */
export const delayedMargin = formula(
  {
    symbol: 'phi_left',
    meaning: 'phase margin left after the delay of sampling',
    unit: 'deg',
    source: 'circuit theory',
  },
  (phi_m, f_c, f_ref, phi_T) => phi_m - (phi_T * f_c) / (2 * f_ref),
)

export const LIMIT_RATIO = {
  symbol: 'n_lim',
  meaning: 'reference over the largest bandwidth',
  unit: '1',
  source: 'F. M. Gardner, IEEE Trans. Commun. 28(11), 1980',
  value: 10,
}
export const REALIGNMENT = {
  symbol: 'k_re',
  meaning: 'effective bandwidth of a realigned oscillator over its reference, at low offsets',
  unit: '1',
  source: 'derived: √3/2π = 0.276 from what edges that set the phase leave at low offsets',
  value: 0.27,
}
export const FULL_TURN = {
  symbol: 'phi_T',
  meaning: 'a full turn',
  unit: 'deg',
  source: 'definition',
  value: 360,
}
