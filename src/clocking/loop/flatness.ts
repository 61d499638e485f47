import type { Bench } from '../../blocks/bench.ts'
import { PLAIN } from '../../derivation/trace.ts'
import { type ClockLoop, optimumOf } from './clock-loop.ts'
import { loopIntegrals } from './integrals.ts'
import { lineJitters, sumOf } from './line-jitter.ts'
import { guardedBandwidth } from './shape.ts'

/** The bandwidth of the least jitter, and how much jitter other bandwidths give. SI. */
export interface Flatness {
  readonly f_opt: number
  readonly atLimit: boolean
  readonly sigma_opt: number
  /** At half and at twice the optimum. */
  readonly sigma_half: number
  readonly sigma_double: number
}

/** The optimum of a loop and its flatness; null for a realigned oscillator, whose bandwidth its reference gives. */
export function flatnessOf(loop: ClockLoop, bench: Bench): Flatness | null {
  const { f_lim, problem, sources } = loop
  if (f_lim === null) return null
  const best = optimumOf(bench, problem, guardedBandwidth.run(f_lim, bench.guard))
  const at = (f_c: number): number => {
    const { plain, tracked } = loopIntegrals(problem, f_c)
    return sumOf(lineJitters(sources, tracked ?? plain, f_c, PLAIN), PLAIN)
  }
  return {
    f_opt: best.f_c,
    atLimit: best.atLimit,
    sigma_opt: at(best.f_c),
    sigma_half: at(best.f_c / 2),
    sigma_double: at(best.f_c * 2),
  }
}
