import type { Ctle } from '../pulse/filters.ts'
import { PER_SYMBOL, type Pulse, pulseBehind, type Received } from '../pulse/received.ts'
import { type Disturbance, type Feedback, type Merit, meritOf } from './merit.ts'

/** Search for the equaliser settings of the best signal over disturbance. */

/** What the option gives the equalisers. */
export interface EqualiserLimits {
  /** Transmit taps, the main one included. */
  readonly transmitTaps: number
  /** Gains at low frequency that may be tried [dB]. */
  readonly gains: readonly number[]
  readonly receiveTaps: number
  readonly feedback: Feedback
}

/** Transmit taps: one symbol before, the main one, one after; their sizes add up to one. */
export interface TransmitTaps {
  readonly before: number
  readonly main: number
  readonly after: number
}

/** Settings found, and the pulse that they leave. */
export interface Settled {
  readonly ctle: Ctle
  readonly transmit: TransmitTaps
  /** The equalised pulse, PER_SYMBOL samples a symbol [V], before receive taps and feedback. */
  readonly samples: Float64Array
  /** Noise behind the continuous-time equaliser [V²] by lag. */
  readonly noise: Float64Array
  /** Sample of the main cursor. */
  readonly instant: number
  readonly merit: Merit
}

/** Symbols before and after the main cursor that are looked at. */
const SYMBOLS_BEFORE = 10
const SYMBOLS_AFTER = 72
const BEFORE = [0, -0.04, -0.08, -0.12, -0.16, -0.2]
const AFTER = [0, -0.05, -0.1, -0.15, -0.2, -0.25, -0.3]
/** Coarser steps where every candidate needs a solution for its receive taps. */
const BEFORE_COARSE = [0, -0.08, -0.16]
const AFTER_COARSE = [0, -0.1, -0.2]
/** Steps of the second search around the best of the first: gain [dB] and taps. */
const GAIN_STEPS = [-2, 0, 2]
const TAP_STEP = { before: 0.04, after: 0.05 }

/** Continuous-time equaliser with this gain at low frequency [dB] at a symbol rate [Hz]; zero and poles as in 802.3cd/ck. */
export const ctleAt = (g_DC: number, f_B: number): Ctle => ({
  g_DC,
  g_DC2: 0,
  f_z: f_B / 2.5,
  f_p1: f_B / 2.5,
  f_p2: f_B,
  f_LF: f_B / 80,
})

/** Transmit taps with these side taps; what they take is missing from the main one. */
export const transmitTaps = (before: number, after: number): TransmitTaps => ({
  before,
  main: 1 - Math.abs(before) - Math.abs(after),
  after,
})

/**
 * Best settings over gain and transmit taps: all of them, or with receive taps a coarse search and a finer one around
 * its best.
 *
 * @param received spectra of the path
 * @param limits what may be used
 * @param given what disturbs, apart from the noise and the slopes that the settings decide
 */
export function settledFor(
  received: Received,
  limits: EqualiserLimits,
  given: Omit<Disturbance, 'noise' | 'slopes'>,
): Settled {
  const { transmitTaps: count, gains } = limits
  const pulses = new Map<number, Pulse>()
  const pulseAt = (gain: number): Pulse => {
    const known = pulses.get(gain) ?? pulseBehind(received, ctleAt(gain, received.path.f_B))
    pulses.set(gain, known)
    return known
  }
  const bestOf = (
    tried: readonly number[],
    befores: readonly number[],
    afters: readonly number[],
    start: Settled | null,
  ): Settled =>
    tried.reduce<Settled | null>((outer, gain) => {
      const ctle = ctleAt(gain, received.path.f_B)
      return befores.reduce<Settled | null>(
        (most, before) =>
          afters.reduce<Settled | null>((best, after) => {
            const found = candidate(pulseAt(gain), ctle, transmitTaps(before, after), limits, given)
            return best === null || found.merit.ratio > best.merit.ratio ? found : best
          }, most),
        outer,
      )
    }, start)!
  if (limits.receiveTaps <= 1) {
    return bestOf(gains, count >= 3 ? BEFORE : [0], count >= 2 ? AFTER : [0], null)
  }
  const coarse = bestOf(
    gains.filter((_, k) => k % 4 === 0),
    count >= 3 ? BEFORE_COARSE : [0],
    count >= 2 ? AFTER_COARSE : [0],
    null,
  )
  const { before, after } = coarse.transmit
  const near = gains.filter((gain) => GAIN_STEPS.includes(Math.round(gain - coarse.ctle.g_DC)))
  return bestOf(
    near,
    count >= 3 ? around(before, TAP_STEP.before) : [0],
    count >= 2 ? around(after, TAP_STEP.after) : [0],
    coarse,
  )
}

/** A tap and its neighbours on the side that equalises. */
const around = (tap: number, step: number): readonly number[] =>
  [tap - step, tap, tap + step].filter((one) => one <= 1e-12 && one > -0.45)

function candidate(
  { samples, noise }: Pulse,
  ctle: Ctle,
  transmit: TransmitTaps,
  limits: EqualiserLimits,
  given: Omit<Disturbance, 'noise' | 'slopes'>,
): Settled {
  const sent = throughTransmit(samples, transmit)
  const instant = samplingInstant(sent, limits.feedback)
  const merit = meritAt(sent, noise, instant, limits, given)
  return { ctle, transmit, samples: sent, noise, instant, merit }
}

/** A pulse through the transmit taps. */
export function throughTransmit(pulse: Float64Array, { before, main, after }: TransmitTaps): Float64Array {
  const out = new Float64Array(pulse.length)
  for (let k = 0; k < pulse.length; k++) {
    const early = k + PER_SYMBOL < pulse.length ? pulse[k + PER_SYMBOL]! : 0
    const late = k >= PER_SYMBOL ? pulse[k - PER_SYMBOL]! : 0
    out[k] = main * pulse[k]! + before * early + after * late
  }
  return out
}

/**
 * The instant at which the cursor before equals the one after less what the first feedback tap takes, near the peak:
 * where a phase detector that compares them settles. Source: IEEE 802.3bj-2014, 93A.1.6.
 */
export function samplingInstant(pulse: Float64Array, { taps, limit }: Feedback): number {
  let peak = 0
  for (let k = 0; k < pulse.length; k++) if (pulse[k]! > pulse[peak]!) peak = k
  const balance = (k: number): number => {
    const [early, on, late] = [pulse[k - PER_SYMBOL]!, pulse[k]!, pulse[k + PER_SYMBOL]!]
    const fed = taps > 0 ? Math.min(limit * on, Math.max(-limit * on, late)) : 0
    return early - (late - fed)
  }
  const from = Math.max(PER_SYMBOL, peak - PER_SYMBOL)
  const to = Math.min(pulse.length - PER_SYMBOL - 1, peak + PER_SYMBOL)
  let best = peak
  let least = Number.POSITIVE_INFINITY
  for (let k = from; k <= to; k++) {
    if (pulse[k]! < 0.5 * pulse[peak]!) continue
    const off = Math.abs(balance(k))
    if (off < least) {
      least = off
      best = k
    }
  }
  return best
}

/** Signal over disturbance at a sampling instant. */
export function meritAt(
  samples: Float64Array,
  noise: Float64Array,
  instant: number,
  { receiveTaps, feedback }: Pick<EqualiserLimits, 'receiveTaps' | 'feedback'>,
  given: Omit<Disturbance, 'noise' | 'slopes'>,
): Merit {
  const count = SYMBOLS_BEFORE + SYMBOLS_AFTER + 1
  const at = (k: number): number => (k >= 0 && k < samples.length ? samples[k]! : 0)
  const cursors = new Float64Array(count)
  const slopes = new Float64Array(count)
  for (let k = 0; k < count; k++) {
    const place = instant + (k - SYMBOLS_BEFORE) * PER_SYMBOL
    cursors[k] = at(place)
    slopes[k] = ((at(place + 1) - at(place - 1)) * PER_SYMBOL) / 2
  }
  return meritOf(cursors, SYMBOLS_BEFORE, Math.max(1, receiveTaps), feedback, { ...given, noise, slopes })
}
