import { formula } from '../../derivation/formula.ts'

/** What no receiver beats: bounds on the signal-to-noise ratio at the decision, from the folded spectrum. */

/**
 * Signal-to-noise density per symbol Γ over the Nyquist band: (σ_x²/T) Σ_k |P(f + k/T)|²/N2(f + k/T).
 *
 * Source: J. Salz, BSTJ 52(8), 1973; J. M. Cioffi et al., IEEE Trans. Commun. 43, 1995.
 */
export interface Folded {
  /** Γ at the middle of equal steps of the band 0 … f_B/2 [1]. */
  readonly gamma: Float64Array
}

/** An image below this share ends the sum: those further out are smaller still, 1e-4 in all. */
const NEGLIGIBLE = 1e-7

/** Steps of the Nyquist band. */
const STEPS = 256

/**
 * Folds a received pulse and white noise into the Nyquist band.
 *
 * @param magnitude |P(f)| of the received pulse [V s]
 * @param f_B symbol rate [Hz]
 * @param sigma_x2 mean square of the symbols [1]
 * @param eta_0 one-sided noise density [V²/Hz]; two-sided is half of it
 * @param folds images to each side at most
 * @returns Γ over the band; the trapezoid error of its means is below 1e-3 dB for smooth spectra
 */
export function folded(
  magnitude: (f: number) => number,
  f_B: number,
  sigma_x2: number,
  eta_0: number,
  folds: number,
): Folded {
  const gamma = new Float64Array(STEPS)
  for (let k = 0; k < STEPS; k++) {
    const f = ((k + 0.5) / STEPS) * (f_B / 2)
    let sum = magnitude(f) ** 2
    for (let n = 1; n <= folds; n++) {
      const pair = magnitude(n * f_B - f) ** 2 + magnitude(n * f_B + f) ** 2
      sum += pair
      if (pair < NEGLIGIBLE * sum) break
    }
    gamma[k] = (sigma_x2 * f_B * sum) / (eta_0 / 2)
  }
  return { gamma }
}

const mean = (values: Float64Array, of: (value: number) => number): number => {
  let sum = 0
  for (const value of values) sum += of(value)
  return sum / values.length
}

/** Matched-filter bound: the mean of Γ [1]. */
export const matchedFilter = ({ gamma }: Folded): number => mean(gamma, (one) => one)
/** MMSE decision feedback of any length, unbiased (Salz): exp(mean ln(1 + Γ)) − 1 [1]. */
export const salz = ({ gamma }: Folded): number => Math.exp(mean(gamma, (one) => Math.log1p(one))) - 1
/** Zero-forcing decision feedback: exp(mean ln Γ) [1]. */
export const zeroForcingFeedback = ({ gamma }: Folded): number => Math.exp(mean(gamma, Math.log))
/** MMSE linear equaliser of any length, unbiased: 1/mean(1/(1 + Γ)) − 1 [1]. */
export const linearBound = ({ gamma }: Folded): number => 1 / mean(gamma, (one) => 1 / (1 + one)) - 1
/** Zero-forcing linear equaliser: 1/mean(1/Γ) [1]. */
export const zeroForcingLinear = ({ gamma }: Folded): number => 1 / mean(gamma, (one) => 1 / one)

/** σ_x² = (M² − 1)/(3(M − 1)²): mean square of equally likely levels within ±1. M [1] → [1]. */
export const symbolPower = formula(
  {
    symbol: 'sigma_x2',
    meaning: 'mean square of the symbols, the outer ones at ±1',
    unit: '1',
    source: 'definition',
  },
  (M) => (M ** 2 - 1) / (3 * (M - 1) ** 2),
)
