/**
 * Transfer of a phase-locked loop from its sources to its output.
 *
 * Type II, third order, filter of C1 beside R and C2 in series: with the zero at f_c/√b and the pole at f_c √b, where
 * the phase margin is largest, and |T| = 1 at f_c,
 *   T = −(1 + j u √b)/(√b u² (1 + j u/√b)),  u = f/f_c.
 * Sampling delays it by half a reference period. An oscillator realigned at every edge of its reference forgets what it
 * gathered since the last one: averaged over the period, x = 2πf/f_ref, |1 − H|² = 2(1 − sin x/x), and the reference
 * passes with the area of sinc²(f/f_ref), f_ref/2, here of first order with its corner at f_ref/π. With no sampling
 * frequency it is a plain loop of first order.
 *
 * Source: F. M. Gardner, IEEE Trans. Commun. 28(11), 1980, and Phaselock Techniques, 3rd ed., 2005; C. S. Vaucher,
 * Architectures for RF Frequency Synthesizers, 2002.
 */

export interface LoopShape {
  readonly kind: 'type-II' | 'realigned'
  /** Unity-gain frequency [Hz]. */
  readonly f_c: number
  /** √b, the root of pole over zero [1]. Not used by a loop of first order. */
  readonly r: number
  /** Sampling frequency [Hz]: its half period delays the loop, its edges realign the oscillator; null for none. */
  readonly f_ref: number | null
}

/** |T/(1+T)|² and 1/|1+T|² over offsets. */
export interface ClosedLoop {
  readonly low: Float64Array
  readonly high: Float64Array
}

/**
 * Closed-loop power transfers: `low` for what enters at the detector (over N²), `high` for what the oscillator adds.
 *
 * @param f offsets [Hz]
 * @param shape the loop
 * @returns both transfers [1], offset by offset
 */
export function closedLoopOver(f: ArrayLike<number>, shape: LoopShape): ClosedLoop {
  const low = new Float64Array(f.length)
  const high = new Float64Array(f.length)
  if (shape.kind === 'realigned') {
    firstOrder(f, shape.f_ref === null ? shape.f_c : shape.f_ref / Math.PI, low, high)
    if (shape.f_ref !== null) realigned(f, shape.f_ref, high)
  } else thirdOrder(f, shape, low, high)
  return { low, high }
}

function firstOrder(f: ArrayLike<number>, f_c: number, low: Float64Array, high: Float64Array): void {
  for (let k = 0; k < f.length; k++) {
    const x = (f[k]! / f_c) ** 2
    low[k] = 1 / (1 + x)
    high[k] = x / (1 + x)
  }
}

/** What is left of an oscillator's own noise between edges that set its phase, averaged over the period. */
function realigned(f: ArrayLike<number>, f_ref: number, high: Float64Array): void {
  for (let k = 0; k < f.length; k++) {
    const x = (2 * Math.PI * f[k]!) / f_ref
    // Below, the series: 1 − sin x/x cancels.
    high[k] = x < 1e-2 ? (x * x) / 3 : 2 * (1 - Math.sin(x) / x)
  }
}

function thirdOrder(
  f: ArrayLike<number>,
  { f_c, r, f_ref }: LoopShape,
  low: Float64Array,
  high: Float64Array,
): void {
  const turn = r - 1 / r
  const lag = f_ref === null ? 0 : Math.PI / f_ref
  for (let k = 0; k < f.length; k++) {
    const u = f[k]! / f_c
    const x = u * u
    const below = -1 / (r * x * (1 + x / (r * r)))
    const [re, im] = [(1 + x) * below, u * turn * below]
    const angle = lag * f[k]!
    const [cos, sin] = lag === 0 ? [1, 0] : [Math.cos(angle), Math.sin(angle)]
    const [a, b] = [1 + re * cos + im * sin, im * cos - re * sin]
    const apart = 1 / (a * a + b * b)
    low[k] = (re * re + im * im) * apart
    high[k] = apart
  }
}

/** Where peaking is looked for, in multiples of the bandwidth. */
const AROUND = [0.02, 40] as const
const PLACES = 400

/**
 * Closed-loop peaking: the largest of |T/(1+T)|.
 *
 * @param shape the loop
 * @returns peaking [dB], 0 or more; error below 0.001 dB
 */
export function peakingOf(shape: LoopShape): number {
  const ratio = Math.log(AROUND[1] / AROUND[0]) / (PLACES - 1)
  const f = Float64Array.from({ length: PLACES }, (_, k) => shape.f_c * AROUND[0] * Math.exp(k * ratio))
  const largest = closedLoopOver(f, shape).low.reduce((most, one) => Math.max(most, one), 1)
  return 10 * Math.log10(largest)
}
