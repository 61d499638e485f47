import type { Bench } from '../../blocks/bench.ts'
import type { ClockLoop } from './clock-loop.ts'
import { filterCapacitance, filterResistor, poleCapacitor, zeroCapacitor } from './filter.ts'

/** Components of the loop filter. SI. */
export interface FilterParts {
  readonly C_sum: number
  readonly C1: number
  readonly C2: number
  readonly R: number
}

/** Components that give the loop its bandwidth and phase margin; null for a realigned oscillator. */
export function filterPartsOf(
  { sources, f_c, r, problem }: ClockLoop,
  { settings, t }: Bench,
): FilterParts | null {
  if (problem.kind === 'realigned') return null
  const I_CP = settings.loop!.charge_pump_current
  const C_sum = t.calc(filterCapacitance, I_CP, sources.K_V, r, sources.N, f_c)
  const C2 = t.calc(zeroCapacitor, C_sum, r)
  return { C_sum, C1: t.calc(poleCapacitor, C_sum, r), C2, R: t.calc(filterResistor, r, f_c, C2) }
}
