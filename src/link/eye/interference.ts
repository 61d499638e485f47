/**
 * Amplitude of what disturbs a decision, as a sum of independent parts: cursors, each times a symbol, and one Gaussian.
 *
 * The symbols are equally likely levels evenly spaced over −1 … 1. Sampling jitter of two Diracs enters as one more
 * cursor for each: ±A_DD times the slope there (IEEE 802.3bj-2014, 93A.1.6).
 */
export interface Interference {
  /** Levels, a power of two [1]. */
  readonly levels: number
  /** Cursors [V]. */
  readonly cursors: Float64Array
  /** Standard deviation of the Gaussian part [V]. */
  readonly sigma: number
}

/** The logarithm of a moment and its first two derivatives. */
export interface Moment {
  /** K(s) = ln E e^(s y) [1]. */
  readonly K: number
  /** K′: mean under the tilted distribution [V]. */
  readonly K1: number
  /** K″: its variance [V²]. */
  readonly K2: number
}

/** ln cosh x, free of overflow. */
const logCosh = (x: number): number => {
  const size = Math.abs(x)
  return size + Math.log1p(Math.exp(-2 * size)) - Math.LN2
}

/**
 * Logarithm of the moment at s: a symbol of 2^b levels is b independent signs of weight 2^j/(2^b − 1), so a cursor h
 * gives Σ_j ln cosh(2^j h s/(M − 1)), and the Gaussian σ² s²/2.
 *
 * @param interference the disturbance
 * @param s tilt [1/V]
 */
export function logMoment({ levels, cursors, sigma }: Interference, s: number): Moment {
  let K = (sigma * sigma * s * s) / 2
  let K1 = sigma * sigma * s
  let K2 = sigma * sigma
  for (const cursor of cursors) {
    for (let weight = 1; weight < levels; weight *= 2) {
      const h = (weight * cursor) / (levels - 1)
      const slope = Math.tanh(h * s)
      K += logCosh(h * s)
      K1 += h * slope
      K2 += h * h * (1 - slope * slope)
    }
  }
  return { K, K1, K2 }
}

/** A cursor below this share of the Gaussian part is told from a Gaussian by less than 1e-4 of any tail above 1e-16. */
const SMALL = 0.03
/** Least Gaussian part, as a share of the whole: a distribution of steps has no tail that a quantile could be read from. */
const SMEAR = 1 / 400

/**
 * The same disturbance with its smallest cursors in the Gaussian part, their variance kept.
 *
 * @returns cursors in falling size; a Gaussian of at least 1/400 of the whole, which smooths steps where there is no noise
 */
export function gathered({ levels, cursors, sigma }: Interference): Interference {
  const share = (levels + 1) / (3 * (levels - 1))
  const rising = Float64Array.from(cursors, Math.abs).sort()
  let whole = sigma * sigma
  for (const cursor of rising) whole += share * cursor * cursor
  let variance = Math.max(sigma * sigma, SMEAR * SMEAR * whole)
  let first = 0
  while (first < rising.length && rising[first]! <= SMALL * Math.sqrt(variance)) {
    variance += share * rising[first]! ** 2
    first++
  }
  return { levels, cursors: rising.subarray(first).reverse(), sigma: Math.sqrt(variance) }
}
