import { gathered, type Interference, logMoment } from './interference.ts'

/**
 * Tails of the disturbance of a decision, exact to rounding at any probability.
 *
 * P(y > x) = (1/2πi) ∫ e^(K(s) − s x)/s ds along a line of positive real part c. On the line through the saddle
 * K′(c) = x the integrand neither cancels nor oscillates where it counts, and the trapezoid rule converges faster than
 * any power of its step. So the many-fold convolution of the cursors is never formed, and no voltage grid limits it.
 *
 * Source: H. E. Daniels, Annals of Mathematical Statistics 25, 1954 (the contour); L. N. Trefethen & J. A. C. Weideman,
 * SIAM Review 56(3), 2014 (the rule).
 */

/** Least tilt times the standard deviation: nearer to the pole at zero the rule would need a finer step. */
const LEAST_TILT = 0.7
/** Multiples of the Gaussian part beyond which its factor is below 1e-9. */
const REACH = 6.6
const MOST_POINTS = 8192

/** A distribution ready for tails. */
export interface Tails {
  readonly parts: Interference
  /** Standard deviation of the whole [V]. */
  readonly deviation: number
}

/** Prepares tails; null when nothing disturbs. */
export function tailsOf(interference: Interference): Tails | null {
  const parts = gathered(interference)
  const deviation = Math.sqrt(logMoment(parts, 0).K2)
  return deviation > 0 ? { parts, deviation } : null
}

/** The tilt whose mean is x: K′(s) = x, by Newton steps kept within brackets. */
function saddle({ parts, deviation }: Tails, x: number): number {
  let [low, high] = [LEAST_TILT / deviation, Number.POSITIVE_INFINITY]
  // The Gaussian part alone reaches x at x/σ²: the saddle of the whole is never beyond.
  let s = Math.max(low, Math.min(x / deviation ** 2, x / parts.sigma ** 2))
  for (let k = 0; k < 60; k++) {
    const { K1, K2 } = logMoment(parts, s)
    if (K1 > x) high = s
    else low = Math.max(low, s)
    let next = s - (K1 - x) / K2
    if (!(next > low && next < high)) next = high === Number.POSITIVE_INFINITY ? 2 * s : (low + high) / 2
    if (K1 > x && s <= LEAST_TILT / deviation) return s
    if (Math.abs(next - s) <= 1e-6 * s) return next
    s = next
  }
  return s
}

/** A line of the contour: the moment on it, from which the tail at every x near its own follows. */
interface Line {
  readonly c: number
  readonly K: number
  /** The x whose saddle it passes, and the standard deviation under its tilt [V]. */
  readonly centre: number
  readonly deviation: number
  readonly step: number
  readonly re: Float64Array
  readonly im: Float64Array
}

/** Deviations from its own x up to which a line is tried, and how much of its terms may cancel before it is given up. */
const SERVES = 3
const LEAST_LEFT = 0.1

function lineThrough(tails: Tails, x: number): Line {
  const { parts } = tails
  const c = saddle(tails, x)
  const { K, K1, K2 } = logMoment(parts, c)
  const deviation = Math.sqrt(K2)
  const step = (2 * Math.PI) / (Math.max(x, K1) + (8 + SERVES) * deviation + 20 / c)
  const points = Math.min(MOST_POINTS, Math.ceil(REACH / parts.sigma / step))
  return { c, K, centre: Math.max(x, K1), deviation, step, ...alongLine(parts, c, step, points) }
}

const serves = ({ centre, deviation }: Line, x: number): boolean => Math.abs(x - centre) <= SERVES * deviation

/** ln P(y > x) and its derivative by x. */
interface LogTail {
  readonly value: number
  readonly slope: number
  /** The line it was found on. */
  readonly line: Line
}

/** The tail on a line at hand if it serves, else on a new one through x. */
function logTailNear(tails: Tails, line: Line | null, x: number): LogTail {
  if (line !== null && serves(line, x)) {
    const found = onLine(line, x)
    if (found !== null) return found
  }
  const own = lineThrough(tails, x)
  return onLine(own, x) ?? { value: Number.NEGATIVE_INFINITY, slope: -own.c, line: own }
}

/** The tail on a line; null when too much of its terms cancels. */
function onLine(line: Line, x: number): LogTail | null {
  const { c, K, step, re, im } = line
  // Half of the first point, since the line runs to both sides; the density by the same sum without 1/s.
  let [tail, density] = [0.5 / c, 0.5]
  const [turnCos, turnSin] = [Math.cos(step * x), Math.sin(step * x)]
  let [cos, sin] = [turnCos, turnSin]
  for (let n = 1; n < re.length; n++) {
    const w = n * step
    const [a, b] = [re[n]! * cos + im[n]! * sin, im[n]! * cos - re[n]! * sin]
    tail += (a * c + b * w) / (c * c + w * w)
    density += a
    const next = cos * turnCos - sin * turnSin
    sin = sin * turnCos + cos * turnSin
    cos = next
  }
  if (!(tail * c > LEAST_LEFT)) return null
  return { value: K - c * x + Math.log((tail * step) / Math.PI), slope: -density / tail, line }
}

/**
 * P(y > x) at one x or more.
 *
 * Range: any x. Error: relative 1e-6 down to 1e-300, beside the smoothing of {@link gathered} where there is no noise.
 *
 * @param tails the distribution
 * @param at amplitudes [V]; neighbours that lie close share most of the work
 * @returns probability of each [1]
 */
export function tailsAbove(tails: Tails, at: readonly number[]): number[] {
  let line: Line | null = null
  return at.map((x) => {
    const found = logTailNear(tails, line, Math.abs(x))
    line = found.line
    const above = Math.exp(found.value)
    return x < 0 ? 1 - above : above
  })
}

/** e^(K(c + iω) − K(c)) at multiples of a step of ω. */
function alongLine(
  { levels, cursors, sigma }: Interference,
  c: number,
  step: number,
  points: number,
): { readonly re: Float64Array; readonly im: Float64Array } {
  const [re, im] = [new Float64Array(points), new Float64Array(points)]
  for (let n = 0; n < points; n++) {
    const w = n * step
    const size = Math.exp((-sigma * sigma * w * w) / 2)
    re[n] = size * Math.cos(sigma * sigma * c * w)
    im[n] = size * Math.sin(sigma * sigma * c * w)
  }
  for (const cursor of cursors) {
    for (let weight = 1; weight < levels; weight *= 2) {
      timesCosh(re, im, (weight * cursor) / (levels - 1), c, step)
    }
  }
  return { re, im }
}

/** Multiplies by cosh(h (c + iω))/cosh(h c) = cos(hω) + i tanh(h c) sin(hω), the angle stepped by rotation. */
function timesCosh(re: Float64Array, im: Float64Array, h: number, c: number, step: number): void {
  const lean = Math.tanh(h * c)
  const [turnCos, turnSin] = [Math.cos(h * step), Math.sin(h * step)]
  let [cos, sin] = [1, 0]
  for (let n = 0; n < re.length; n++) {
    const [a, b] = [re[n]!, im[n]!]
    const tilted = lean * sin
    re[n] = a * cos - b * tilted
    im[n] = a * tilted + b * cos
    const next = cos * turnCos - sin * turnSin
    sin = sin * turnCos + cos * turnSin
    cos = next
  }
}

/**
 * The amplitude that is exceeded with a probability: Newton steps on ln P.
 *
 * @param tails the distribution
 * @param probability one-sided, 0 < p < 0.5 [1]
 * @returns amplitude [V]
 * @throws RangeError for a probability outside
 */
export function quantileOf(tails: Tails, probability: number): number {
  if (!(probability > 0 && probability < 0.5)) throw new RangeError(`no tail of probability ${probability}`)
  const wanted = Math.log(probability)
  let x = startOf(tails, probability)
  let line: Line | null = null
  for (let k = 0; k < 60; k++) {
    const { value, slope, line: on } = logTailNear(tails, line, x)
    line = on
    const next = Math.max(0, x + (wanted - value) / slope)
    if (Math.abs(next - x) <= 1e-8 * tails.deviation) return next
    x = next
  }
  return x
}

/** A first guess: what the whole would reach were it Gaussian, but no more than all cursors and the Gaussian part together. */
function startOf({ parts, deviation }: Tails, probability: number): number {
  const reach = Math.sqrt(-2 * Math.log(2 * probability))
  const most = parts.cursors.reduce((sum, cursor) => sum + cursor, 0) + parts.sigma * reach
  return Math.min(deviation * reach, most)
}
