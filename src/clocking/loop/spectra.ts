import { powerLawAt } from '../../numeric/power-law.ts'
import type { LoopProblem, Profile } from './problem.ts'

/** Shapes of the sources over offsets, before the loop. */

/** [2 sin(πf/f_ref)]^(2(m−1)): shape of a modulator of order m. f [Hz] below f_ref/2, f_ref [Hz], order [1] → [1]. */
export const modulatorShape = (f: number, f_ref: number, order: number): number =>
  (2 * Math.sin((Math.PI * f) / f_ref)) ** (2 * (order - 1))

/** Density of a measured profile [1/Hz] at an offset [Hz], piecewise in log-log; its end values outside. */
export const profileAt = (table: Profile, f: number): number => powerLawAt(table.offset, table.density, f)

/** Whether a modulator's noise exists at this offset [Hz]: above half the reference there are only its images. */
export const modulated = (f: number, f_ref: number): boolean => f <= f_ref / 2

/** Density [1/Hz] of all that enters at the detector at one offset [Hz]. */
export function lowDensity({ low, f_ref }: LoopProblem, f: number): number {
  const table = low.table === null ? 0 : low.scale * profileAt(low.table, f)
  const modulator =
    low.modulator > 0 && modulated(f, f_ref) ? low.modulator * modulatorShape(f, f_ref, low.order) : 0
  return low.flat + low.flicker / f + modulator + table
}

/** Density [1/Hz] of all that the free-running oscillator adds at one offset [Hz]. */
export function highDensity({ high }: LoopProblem, f: number): number {
  const table = high.table === null ? 0 : high.scale * profileAt(high.table, f)
  return high.flat + (high.flicker + (high.white + high.flicker3 / f) / f) / f + table
}

/** 1/(f² (1 + (f/f_p)²)): shape of the filter resistor's noise. f [Hz], f_c [Hz], r [1] → [1/Hz²]. */
export const filterShape = (f: number, f_c: number, r: number): number =>
  1 / (f * f * (1 + (f / (f_c * r)) ** 2))

/** |f/(f + j f_CDR)|²: what a tracking receiver still sees. f [Hz], f_CDR [Hz] → [1]. */
export const trackedShare = (f: number, f_CDR: number): number => (f * f) / (f * f + f_CDR * f_CDR)
