import type { Interference } from './interference.ts'
import { type Tails, tailsAbove, tailsOf } from './tail.ts'

/** What stands at the decision: a pulse over time, the feedback that is fixed, and what disturbs beside it. SI. */
export interface Decision {
  /** The pulse behind every equaliser but feedback [V]. */
  readonly samples: Float64Array
  readonly perSymbol: number
  /** Sample of the main cursor. */
  readonly instant: number
  /** What feedback takes off the cursors after the main one [V]. */
  readonly fed: Float64Array
  readonly levels: number
  /** Level separation mismatch ratio [1]. */
  readonly R_LM: number
  /** Noise, distortion, crosstalk and quantisation, rms [V]. */
  readonly sigma: number
  /** Half the distance of the jitter's two Diracs [UI]. */
  readonly A_DD: number
  /** Random jitter, rms [UI]. */
  readonly sigma_RJ: number
}

const sampleAt = ({ samples }: Decision, k: number): number =>
  k >= 0 && k < samples.length ? samples[k]! : 0

/** What feedback subtracts from the cursors after the main one, each limited to a share of it [V]. */
export function feedbackOf(
  samples: Float64Array,
  perSymbol: number,
  instant: number,
  taps: number,
  limit: number,
): Float64Array {
  const most = limit * Math.abs(samples[instant]!)
  return Float64Array.from({ length: taps }, (_, k) => {
    const cursor = samples[instant + (k + 1) * perSymbol] ?? 0
    return Math.min(most, Math.max(-most, cursor))
  })
}

/** A_s = R_LM h(t_s)/(L − 1): from a level to the nearest threshold [V]. Source: IEEE 802.3bj-2014, 93A.1.6. */
export const signalOf = (decision: Decision): number =>
  (decision.R_LM * sampleAt(decision, decision.instant)) / (decision.levels - 1)

/**
 * What disturbs a decision taken some samples off the main cursor, feedback staying as it is.
 *
 * @param decision the pulse and what is beside it
 * @param off samples from the main cursor
 */
export function disturbanceAt(decision: Decision, off: number): Interference {
  const { samples, perSymbol, instant, fed, levels, A_DD, sigma_RJ } = decision
  const now = instant + off
  const first = now % perSymbol
  const cursors: number[] = []
  const slopes: number[] = []
  for (let k = first; k < samples.length; k += perSymbol) {
    const after = (k - now) / perSymbol
    const cursor = samples[k]!
    if (after !== 0) cursors.push(after > 0 && after <= fed.length ? cursor - fed[after - 1]! : cursor)
    slopes.push(((sampleAt(decision, k + 1) - sampleAt(decision, k - 1)) * perSymbol) / 2)
  }
  const power = (levels + 1) / (3 * (levels - 1))
  const steep = slopes.reduce((sum, slope) => sum + slope * slope, 0)
  return {
    levels,
    cursors: Float64Array.from(A_DD === 0 ? cursors : [...cursors, ...slopes.map((slope) => A_DD * slope)]),
    sigma: Math.sqrt(decision.sigma ** 2 + sigma_RJ ** 2 * power * steep),
  }
}

/** Error ratio of one threshold against one level, by time off the instant [UI]. */
export interface Bathtub {
  readonly at: readonly number[]
  readonly ratio: readonly number[]
}

/** Error ratio over one symbol around the instant; thresholds stay. */
export function bathtubOverTime(decision: Decision): Bathtub {
  const { perSymbol } = decision
  const offs = Array.from({ length: perSymbol + 1 }, (_, k) => k - perSymbol / 2)
  return { at: offs.map((off) => off / perSymbol), ratio: offs.map((off) => errorsOff(decision, off)) }
}

/**
 * Error ratio of a threshold some samples off the instant: the mean over the levels that have one below them, each moved
 * towards it by what the main cursor has lost times its own symbol.
 */
function errorsOff(decision: Decision, off: number): number {
  const { instant, levels } = decision
  const tails = tailsOf(disturbanceAt(decision, off))
  const change = sampleAt(decision, instant + off) - sampleAt(decision, instant)
  const distances = Array.from({ length: levels - 1 }, (_, k) => {
    const symbol = (2 * (k + 1)) / (levels - 1) - 1
    return signalOf(decision) + symbol * change
  })
  return errorsAt(tails, distances).reduce((sum, one) => sum + one, 0) / (levels - 1)
}

/** Error ratio by distance of the threshold from its middle [V], at the instant. */
export function bathtubOverVoltage(decision: Decision, steps: number): Bathtub {
  const signal = signalOf(decision)
  const tails = tailsOf(disturbanceAt(decision, 0))
  const at = Array.from({ length: 2 * steps + 1 }, (_, k) => ((k - steps) / steps) * signal)
  const distances = at.map((v) => signal - Math.abs(v))
  return { at, ratio: errorsAt(tails, distances) }
}

function errorsAt(tails: Tails | null, distances: readonly number[]): number[] {
  return tails === null ? distances.map((distance) => (distance > 0 ? 0 : 1)) : tailsAbove(tails, distances)
}

/**
 * Time over which the error ratio stays at or below a target [UI], by lines through the logarithm of the ratio.
 *
 * @returns null when it is above the target at the instant itself: the eye is closed
 */
export function widthOf({ at, ratio }: Bathtub, target: number): number | null {
  const middle = at.indexOf(0)
  if (!(ratio[middle]! <= target)) return null
  const edge = (direction: 1 | -1): number => {
    let k = middle
    while (k + direction >= 0 && k + direction < at.length && ratio[k + direction]! <= target) k += direction
    const next = k + direction
    if (next < 0 || next >= at.length) return Math.abs(at[k]!)
    const [inside, outside] = [Math.log(Math.max(ratio[k]!, 1e-300)), Math.log(ratio[next]!)]
    const share = (Math.log(target) - inside) / (outside - inside)
    return Math.abs(at[k]! + share * (at[next]! - at[k]!))
  }
  return edge(1) + edge(-1)
}
