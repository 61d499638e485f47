import { solveSymmetric } from '../../numeric/symmetric.ts'

/** Signal over everything that disturbs a decision, for a pulse sampled once a symbol. */

/** What disturbs besides the pulse itself. SI. */
export interface Disturbance {
  /** Noise autocorrelation at whole symbols [V²]. */
  readonly noise: Float64Array
  /** Crosstalk and quantisation, white [V²]. */
  readonly white: number
  /** Distortion of the transmitter over its signal, power [1]. */
  readonly distortion: number
  /** Mean square of the symbols [1]. */
  readonly sigma_x2: number
  /** Variance of the sampling instant [UI²] and slopes of the pulse at every symbol [V/UI]. */
  readonly jitter: number
  readonly slopes: Float64Array
}

/** Feedback taps and their largest size over the main cursor. */
export interface Feedback {
  readonly taps: number
  readonly limit: number
}

/** A choice of digital equaliser for one sampling instant. */
export interface Merit {
  /** Signal over disturbance at the decision, unbiased [1]. */
  readonly ratio: number
  /** Feed-forward taps, the main cursor at one; `before` of them precede it. */
  readonly taps: Float64Array
  readonly before: number
  /** Cursors behind the feed-forward equaliser and the feedback, the main one at `main` [V]. */
  readonly cursors: Float64Array
  readonly main: number
  /** Variance by cause at the decision [V²]. */
  readonly parts: {
    readonly interference: number
    readonly noise: number
    readonly distortion: number
    readonly jitter: number
  }
}

const clipped = (value: number, limit: number): number => Math.min(limit, Math.max(-limit, value))

/**
 * MMSE feed-forward taps with decision feedback for a pulse sampled once a symbol.
 *
 * Minimises w'(σ_x² Σ h_k h_k' + R)w with w'h_0 = 1 over the cursors that feedback does not take away, so that
 * w ∝ B⁻¹ h_0. Feedback is limited afterwards, and what it leaves counts as interference.
 *
 * @param pulse samples a symbol apart [V]
 * @param main place of the main cursor in it
 * @param count feed-forward taps, 1 for none
 * @param feedback decision feedback
 * @param d what else disturbs
 * @returns the choice; ratio 0 when there is no signal
 */
export function meritOf(
  pulse: Float64Array,
  main: number,
  count: number,
  feedback: Feedback,
  d: Disturbance,
): Merit {
  const before = Math.floor((count - 1) / 3)
  const taps = count === 1 ? Float64Array.of(1) : mmseTaps(pulse, main, count, before, feedback, d)
  return judged(pulse, main, taps, before, feedback, d)
}

const at = (values: Float64Array, k: number): number => (k >= 0 && k < values.length ? values[k]! : 0)

function mmseTaps(
  pulse: Float64Array,
  main: number,
  count: number,
  before: number,
  { taps: fed }: Feedback,
  d: Disturbance,
): Float64Array {
  const B = Array.from({ length: count }, (_, i) => {
    const row = new Float64Array(count)
    for (let j = 0; j <= i; j++) {
      row[j] = correlation(pulse, main, before, i, j, fed, d) + at(d.noise, i - j) + (i === j ? d.white : 0)
    }
    return row
  })
  const w = Float64Array.from({ length: count }, (_, i) => at(pulse, main + before - i))
  if (!solveSymmetric(B, w)) return w.map((_, k) => (k === before ? 1 : 0))
  let scale = 0
  for (let i = 0; i < count; i++) scale += w[i]! * at(pulse, main + before - i)
  const centre = w[before] === 0 ? 1 : w[before]!
  return scale === 0 ? w.map((_, k) => (k === before ? 1 : 0)) : w.map((one) => one / centre)
}

/** σ_x² Σ_k h_k,i h_k,j over the cursors left, and what distortion and jitter add, which follow the same pulse. */
function correlation(
  pulse: Float64Array,
  main: number,
  before: number,
  i: number,
  j: number,
  fed: number,
  { sigma_x2, distortion, jitter, slopes }: Disturbance,
): number {
  let sum = 0
  for (let k = 0; k < pulse.length; k++) {
    const offset = k - main
    const [a, b] = [k + before - i, k + before - j]
    const product = at(pulse, a) * at(pulse, b)
    const left = offset === 0 || (offset > 0 && offset <= fed) ? 0 : 1
    sum += product * (left + distortion) + jitter * at(slopes, a) * at(slopes, b)
  }
  return sigma_x2 * sum
}

function judged(
  pulse: Float64Array,
  main: number,
  taps: Float64Array,
  before: number,
  feedback: Feedback,
  d: Disturbance,
): Merit {
  const through = (values: Float64Array): Float64Array => {
    const out = new Float64Array(values.length)
    for (let k = 0; k < values.length; k++) {
      let sum = 0
      for (let i = 0; i < taps.length; i++) sum += taps[i]! * at(values, k + before - i)
      out[k] = sum
    }
    return out
  }
  const cursors = through(pulse)
  const signal = cursors[main]!
  let distorted = 0
  for (const one of cursors) distorted += one * one
  for (let k = 1; k <= feedback.taps && main + k < cursors.length; k++) {
    cursors[main + k]! -= clipped(cursors[main + k]!, feedback.limit * Math.abs(signal))
  }
  let interference = 0
  for (let k = 0; k < cursors.length; k++) if (k !== main) interference += cursors[k]! ** 2
  let sloped = 0
  for (const one of through(d.slopes)) sloped += one * one
  const parts = {
    interference: d.sigma_x2 * interference,
    noise: noiseThrough(taps, d),
    distortion: d.sigma_x2 * d.distortion * distorted,
    jitter: d.sigma_x2 * d.jitter * sloped,
  }
  const all = parts.interference + parts.noise + parts.distortion + parts.jitter
  return { ratio: (d.sigma_x2 * signal * signal) / all, taps, before, cursors, main, parts }
}

function noiseThrough(taps: Float64Array, { noise, white }: Disturbance): number {
  let sum = 0
  for (let i = 0; i < taps.length; i++) {
    for (let j = 0; j < taps.length; j++) sum += taps[i]! * taps[j]! * at(noise, Math.abs(i - j))
    sum += taps[i]! ** 2 * white
  }
  return sum
}
