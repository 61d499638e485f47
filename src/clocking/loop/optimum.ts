import { leastOn } from '../../numeric/minimum.ts'
import { logSpaced, powerLawIntegral } from '../../numeric/power-law.ts'
import type { LoopProblem } from './problem.ts'
import { filterShape, highDensity, lowDensity, trackedShare } from './spectra.ts'
import { closedLoopOver } from './transfer.ts'

/** Points a decade while the optimum is looked for; the integrals that count are finer. */
const COARSE = 20
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
 * Variance of the phase, up to a factor, as a function of the bandwidth: behind the tracking receiver where there is one.
 *
 * @param problem the loop and its sources
 * @returns function of f_c [Hz] → ∫L df [1]
 */
export function noiseOver(problem: LoopProblem): (f_c: number) => number {
  const { kind, r, f_1, f_2, f_ref, f_CDR, delayed, filter } = problem
  const f = logSpaced(f_1, f_2, COARSE)
  const seen = f_CDR === null ? f.map(() => 1) : f.map((at) => trackedShare(at, f_CDR))
  const low = f.map((at, k) => seen[k]! * lowDensity(problem, at))
  const high = f.map((at, k) => seen[k]! * highDensity(problem, at))
  const total = new Float64Array(f.length)
  return (f_c) => {
    const loop = closedLoopOver(f, { kind, f_c, r, f_ref: delayed ? f_ref : null })
    for (let k = 0; k < f.length; k++) {
      const resistor = filter === 0 ? 0 : seen[k]! * filter * f_c * filterShape(f[k]!, f_c, r)
      total[k] = loop.low[k]! * low[k]! + loop.high[k]! * (high[k]! + resistor)
    }
    return powerLawIntegral(f, total)
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
