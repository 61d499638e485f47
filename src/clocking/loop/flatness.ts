import type { Bench } from '../../blocks/bench.ts'
import { PLAIN } from '../../derivation/trace.ts'
import type { Sources } from '../noise/sources.ts'
import { type ClockLoop, optimumOf } from './clock-loop.ts'
import { loopIntegrals } from './integrals.ts'
import { lineJitters, sumOf } from './line-jitter.ts'
import { noiseOver } from './optimum.ts'
import type { LoopProblem } from './problem.ts'
import { delayedMargin, FULL_TURN, guardedBandwidth } from './shape.ts'

/** The bandwidth of the least jitter before any tracking, and how much jitter other bandwidths give. SI. */
export interface Flatness {
  readonly f_opt: number
  readonly atLimit: boolean
  readonly sigma_opt: number
  /** At half and at twice the optimum. */
  readonly sigma_half: number
  /** Null when sampling leaves no phase margin there. */
  readonly sigma_double: number | null
}

/** The optimum of a loop and its flatness; null for a realigned oscillator, whose bandwidth its reference gives. */
export function flatnessOf(loop: ClockLoop, bench: Bench): Flatness | null {
  const { f_lim, problem, sources, atLimit } = loop
  if (f_lim === null) return null
  const stated = atLimit === null
  const best = stated
    ? optimumOf(bench, problem, guardedBandwidth.run(f_lim, bench.guard))
    : { f_c: loop.f_c, atLimit }
  const sigma_opt = stated ? jitterAt(problem, sources, best.f_c) : loop.sigma_plain
  const noise = noiseOver(problem)
  const at = (f_c: number): number => sigma_opt * Math.sqrt(noise(f_c) / noise(best.f_c))
  const { phase_margin } = bench.settings.loop!
  const left = delayedMargin.run(phase_margin, 2 * best.f_c, problem.f_ref, FULL_TURN.value)
  return {
    f_opt: best.f_c,
    atLimit: best.atLimit,
    sigma_opt,
    sigma_half: at(best.f_c / 2),
    sigma_double: left > 0 ? at(best.f_c * 2) : null,
  }
}

function jitterAt(problem: LoopProblem, sources: Sources, f_c: number): number {
  const { plain } = loopIntegrals(problem, f_c)
  return sumOf(lineJitters(sources, plain, f_c, PLAIN), PLAIN)
}
