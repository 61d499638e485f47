import { leastOn } from '../../numeric/minimum.ts'
import { logSpaced } from '../../numeric/power-law.ts'
import type { LoopProblem } from './problem.ts'
import { filterShape, highDensity, lowDensity } from './spectra.ts'
import { closedLoopOver } from './transfer.ts'

/** Points a decade while the optimum is looked for; the integrals that count are finer. */
const COARSE = 14
const PLACES = 11
const TOLERANCE = 2e-3
/** Smallest bandwidth looked at, as a share of the largest. */
const WIDEST = 1e-3

/** The bandwidth of the least jitter, and whether it lies at the limit. */
export interface Optimum {
  readonly f_c: number
  readonly atLimit: boolean
}

/**
 * Variance of the phase, up to a factor, as a function of the bandwidth. A receiver that tracks is left out: it
 * would drive the bandwidth down until the loop held nothing, and the wander would be the receiver's to follow.
 * Trapezoids in the logarithm of the offset, to 0.5 %: good for finding the optimum, not for stating jitter.
 *
 * @param problem the loop and its sources
 * @returns function of f_c [Hz] → ∫L df [1]
 */
export function noiseOver(problem: LoopProblem): (f_c: number) => number {
  const { kind, r, f_1, f_2, f_ref, delayed, filter } = problem
  const f = logSpaced(f_1, f_2, COARSE)
  // In ln f the integrand is f L(f); the trapezoid's ends count half.
  const step = Math.log(f_2 / f_1) / (f.length - 1)
  const weight = f.map((at, k) => {
    const end = k === 0 || k === f.length - 1 ? 0.5 : 1
    return end * step * at
  })
  const low = f.map((at, k) => weight[k]! * lowDensity(problem, at))
  const high = f.map((at, k) => weight[k]! * highDensity(problem, at))
  return (f_c) => {
    const loop = closedLoopOver(f, { kind, f_c, r, f_ref: delayed ? f_ref : null })
    let sum = 0
    for (let k = 0; k < f.length; k++) {
      const resistor = filter === 0 ? 0 : weight[k]! * filter * f_c * filterShape(f[k]!, f_c, r)
      sum += loop.low[k]! * low[k]! + loop.high[k]! * (high[k]! + resistor)
    }
    return sum
  }
}

/**
 * The loop bandwidth of the least jitter.
 *
 * @param problem the loop and its sources
 * @param f_most largest bandwidth admitted [Hz]
 * @returns f_c [Hz] to 0.2 %, and whether the limit stops it
 */
export function bestBandwidth(problem: LoopProblem, f_most: number): Optimum {
  const noise = noiseOver(problem)
  const top = Math.log(f_most)
  const { x, atEnd } = leastOn(
    (at) => Math.log(noise(Math.exp(at))),
    top + Math.log(WIDEST),
    top,
    PLACES,
    TOLERANCE,
  )
  return { f_c: atEnd === 'to' ? f_most : Math.exp(x), atLimit: atEnd === 'to' }
}
