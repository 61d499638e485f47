import { formula } from '../../derivation/formula.ts'

/** A density in dBc/Hz is a ratio in one hertz. */
export const ONE_HERTZ = {
  symbol: 'B_1',
  meaning: 'bandwidth of a density',
  unit: 'Hz',
  source: 'definition',
  value: 1,
}

/** A = 10^(L/10)/B_1. L [dBc/Hz], B_1 [Hz] → [1/Hz]. */
export const densityOf = formula(
  { symbol: 'A', meaning: 'phase-noise density', unit: '1/Hz', source: 'definition' },
  (L, B_1) => 10 ** (L / 10) / B_1,
)

/** N = f_0/f_ref. f_0 [Hz], f_ref [Hz] → [1]. */
export const multiplication = formula(
  { symbol: 'N', meaning: 'frequency over that of the reference', unit: '1', source: 'definition' },
  (f_0, f_ref) => f_0 / f_ref,
)

/** A_out = A N². A [1/Hz], N [1] → [1/Hz]. */
export const multiplied = formula(
  {
    symbol: 'A_out',
    meaning: 'density as seen at the output inside the loop bandwidth',
    unit: '1/Hz',
    source: 'ideal multiplication: the same time is N times the phase',
  },
  (A, N) => A * N ** 2,
)

/** N²: factor on densities measured at the reference. N [1] → [1]. */
export const multipliedBy = formula(
  {
    symbol: 'N_sq',
    meaning: 'factor on the density measured at the reference',
    unit: '1',
    source: 'ideal multiplication: the same time is N times the phase',
  },
  (N) => N ** 2,
)
