/**
 * Integral of a positive function given at points that are joined by power laws: straight lines when both axes are
 * logarithmic. Exact for any power law, also x⁻¹. A segment that touches zero has no power law and is taken as a
 * straight line on linear axes.
 *
 * Error: none beyond rounding for piecewise power laws; for a smooth function on points a factor e^h apart about
 * h²/12 times the mean curvature of its logarithm.
 */

/** Segments over which x y changes by less than this, relatively, use the limit of the exponent −1. */
const NEAR = 1e-6

/**
 * Integrates piecewise in log-log.
 *
 * @param x rising positive places [any unit]
 * @param y values there, 0 or more [any unit]
 * @param weight factor at each place that multiplies the values [1]; absent for 1
 * @returns the integral [product of the units]; 0 for fewer than two points
 */
export function powerLawIntegral(
  x: ArrayLike<number>,
  y: ArrayLike<number>,
  weight?: ArrayLike<number>,
): number {
  let sum = 0
  let [x1, y1] = [x[0] ?? 0, (y[0] ?? 0) * (weight === undefined ? 1 : weight[0]!)]
  for (let k = 1; k < x.length; k++) {
    const x2 = x[k]!
    const y2 = weight === undefined ? y[k]! : y[k]! * weight[k]!
    sum += segment(x1, y1, x2, y2)
    x1 = x2
    y1 = y2
  }
  return sum
}

function segment(x1: number, y1: number, x2: number, y2: number): number {
  if (!(y1 > 0 && y2 > 0)) return ((x2 - x1) * (y1 + y2)) / 2
  return area(x1 * y1, x2 * y2, Math.log(x2 / x1), Math.log(y2 / y1))
}

/** Area of a segment from x y at its ends and the logarithms of the ratios of x and y. */
function area(low: number, high: number, span: number, rise: number): number {
  const next = rise + span
  return Math.abs(next) < NEAR ? ((low + high) / 2) * span : ((high - low) * span) / next
}

/** Places whose segments are measured once for many integrals. */
export interface Places {
  readonly x: Float64Array
  readonly inverse: Float64Array
  /** ln(x2/x1) of each segment. */
  readonly span: Float64Array
}

/** Measures rising positive places. */
export const placesOf = (x: Float64Array): Places => ({ x, inverse: x.map((at) => 1 / at), span: risesOf(x) })

/** ln(y2/y1) of each segment; y above 0. */
export function risesOf(y: Float64Array): Float64Array {
  const rises = new Float64Array(Math.max(0, y.length - 1))
  for (let k = 0; k < rises.length; k++) rises[k] = Math.log(y[k + 1]! / y[k]!)
  return rises
}

/**
 * Integrals of y, y/x, y/x² and so on, piecewise in log-log, with the logarithms taken once.
 *
 * @param places the places
 * @param y values above 0 there
 * @param rises their {@link risesOf}
 * @param most largest power n of 1/x^n
 * @returns the integrals for n = 0 to `most`
 */
export function powerLawMoments(
  { x, inverse, span }: Places,
  y: Float64Array,
  rises: Float64Array,
  most: number,
): readonly number[] {
  const sums: number[] = []
  const powers = new Float64Array(x.length)
  for (let k = 0; k < powers.length; k++) powers[k] = x[k]! * y[k]!
  for (let n = 0; n <= most; n++) {
    let sum = 0
    for (let k = 0; k < span.length; k++) {
      sum += area(powers[k]!, powers[k + 1]!, span[k]!, rises[k]! - n * span[k]!)
    }
    sums.push(sum)
    for (let k = 0; k < powers.length; k++) powers[k]! *= inverse[k]!
  }
  return sums
}

/**
 * Value at a place between points joined by power laws; the end values outside.
 *
 * @param x rising positive places
 * @param y positive values there
 * @param at the place
 * @returns the value in the unit of y
 */
export function powerLawAt(x: ArrayLike<number>, y: ArrayLike<number>, at: number): number {
  const last = x.length - 1
  if (at <= x[0]!) return y[0]!
  if (at >= x[last]!) return y[last]!
  let [low, high] = [0, last]
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (x[middle]! <= at) low = middle
    else high = middle
  }
  const share = Math.log(at / x[low]!) / Math.log(x[high]! / x[low]!)
  return y[low]! * (y[high]! / y[low]!) ** share
}

/**
 * Places spaced evenly in the logarithm, both ends included.
 *
 * @param from first place, above 0
 * @param to last place, above `from`
 * @param aDecade points a decade, at least
 */
export function logSpaced(from: number, to: number, aDecade: number): Float64Array {
  const steps = Math.max(2, Math.ceil(Math.log10(to / from) * aDecade))
  const ratio = Math.log(to / from) / steps
  return Float64Array.from({ length: steps + 1 }, (_, k) => (k === steps ? to : from * Math.exp(k * ratio)))
}
