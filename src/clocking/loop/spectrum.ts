import type { Sources } from '../noise/sources.ts'
import type { ClockLoop } from './clock-loop.ts'
import { SOURCE_NAMES, type SourceName } from './line-jitter.ts'
import { filterShape, modulated, modulatorShape, profileAt } from './spectra.ts'
import { closedLoopOver } from './transfer.ts'

/** Phase-noise densities at the output, source by source, over offsets. */
export interface Spectrum {
  readonly offset: Float64Array
  /** [1/Hz] by source. */
  readonly of: Readonly<Record<SourceName, Float64Array>>
  readonly total: Float64Array
}

/**
 * Phase noise at the output of the closed loop.
 *
 * @param loop the clock
 * @param offset offsets [Hz]
 * @returns densities [1/Hz] of each source and of all
 */
export function spectrumOf({ sources: s, f_c, problem }: ClockLoop, offset: Float64Array): Spectrum {
  const { kind, r, f_ref, low, delayed } = problem
  const loop = closedLoopOver(offset, { kind, f_c, r, f_ref: delayed ? f_ref : null })
  const through = (transfer: Float64Array, density: (f: number) => number): Float64Array =>
    offset.map((f, k) => transfer[k]! * density(f))
  const modulator = (f: number): number =>
    s.c_mod > 0 && modulated(f, f_ref) ? s.c_mod * modulatorShape(f, f_ref, low.order) : 0
  const of = {
    reference: through(loop.low, (f) => referenceAt(s, f)),
    detector: through(loop.low, (f) => s.A_det + s.a_fl / f),
    divider: through(loop.low, () => s.A_div),
    modulator: through(loop.low, modulator),
    oscillator: through(loop.high, (f) => freeRunningAt(s, f)),
    supply: through(loop.high, (f) => s.p_2 / (f * f)),
    filter: through(loop.high, (f) => s.q_R * f_c * filterShape(f, f_c, r)),
  }
  const total = offset.map((_, k) => SOURCE_NAMES.reduce((sum, name) => sum + of[name][k]!, 0))
  return { offset, of, total }
}

const referenceAt = (s: Sources, f: number): number =>
  s.A_rb + (s.reference === null ? s.A_ref : s.N_sq * profileAt(s.reference, f))

/** Density of the free-running oscillator [1/Hz] at an offset [Hz]. */
export function freeRunningAt({ measured, scale, oscillator }: Sources, f: number): number {
  if (measured !== null) return scale * profileAt(measured, f)
  const { h_0, h_2, f_fl } = oscillator
  return (h_0 + h_2 / (f * f)) * (1 + f_fl / f)
}

/** Level of a density. density [1/Hz] → [dBc/Hz]. */
export const levelOf = (density: number): number => 10 * Math.log10(density)
