import { logSpaced, powerLawIntegral } from '../../numeric/power-law.ts'
import type { LoopProblem } from './problem.ts'
import { filterShape, modulated, modulatorShape, profileAt, trackedShare } from './spectra.ts'
import { closedLoopOver } from './transfer.ts'

/**
 * Integrals of unit shapes through the closed loop over the band: what is left of each source is its coefficient
 * times one of these, so that draws which only move coefficients integrate nothing again.
 */
export interface ShapeIntegrals {
  /** ∫|H|² df [Hz], ∫|H|²/f df [1]. */
  readonly low0: number
  readonly low1: number
  /** Of the modulator's shape [Hz], and of the measured reference [1]. */
  readonly lowModulator: number
  readonly lowTable: number
  /** ∫|1−H|² f^−n df for n = 0 … 3 [Hz^(1−n)]. */
  readonly high0: number
  readonly high1: number
  readonly high2: number
  readonly high3: number
  /** Of the measured oscillator [1] and of the filter resistor's shape [1/Hz]. */
  readonly highTable: number
  readonly highFilter: number
}

export interface LoopIntegrals {
  readonly plain: ShapeIntegrals
  /** Behind a receiver that tracks; null without one. */
  readonly tracked: ShapeIntegrals | null
}

/** Points a decade of the final integrals: their error is below 1e-4. */
const FINE = 64

/** Offsets of the final integrals [Hz]: even in the logarithm, with every offset of measured profiles in the band. */
export function offsetsOf({ f_1, f_2, f_ref, low, high }: LoopProblem): Float64Array {
  const even = logSpaced(f_1, f_2, FINE)
  const extra = [...(low.table?.offset ?? []), ...(high.table?.offset ?? []), f_ref / 2].filter(
    (f) => f > f_1 && f < f_2,
  )
  return extra.length === 0 ? even : Float64Array.from(new Set([...even, ...extra])).sort()
}

/**
 * Integrals of every unit shape at a loop bandwidth, piecewise in log-log.
 *
 * @param problem the loop and its sources
 * @param f_c bandwidth [Hz]
 * @returns integrals, relative error below 1e-4 where the loop is stable
 */
export function loopIntegrals(problem: LoopProblem, f_c: number): LoopIntegrals {
  const f = offsetsOf(problem)
  const shapes = shapesOver(f, problem, f_c)
  const { f_CDR } = problem
  return {
    plain: integrated(f, shapes),
    tracked:
      f_CDR === null
        ? null
        : integrated(
            f,
            shapes,
            f.map((at) => trackedShare(at, f_CDR)),
          ),
  }
}

type Shapes = Readonly<Record<keyof ShapeIntegrals, Float64Array | null>>

function shapesOver(f: Float64Array, problem: LoopProblem, f_c: number): Shapes {
  const { kind, r, delayed, f_ref, low, high, filter } = problem
  const loop = closedLoopOver(f, { kind, f_c, r, f_ref: delayed ? f_ref : null })
  const of = (transfer: Float64Array, shape: (at: number) => number): Float64Array =>
    f.map((at, k) => transfer[k]! * shape(at))
  const { table: measured } = low
  const { table: oscillator } = high
  return {
    low0: loop.low,
    low1: of(loop.low, (at) => 1 / at),
    lowModulator:
      low.modulator > 0
        ? f
            .filter((at) => modulated(at, f_ref))
            .map((at, k) => loop.low[k]! * modulatorShape(at, f_ref, low.order))
        : null,
    lowTable: measured === null ? null : of(loop.low, (at) => profileAt(measured, at)),
    high0: loop.high,
    high1: of(loop.high, (at) => 1 / at),
    high2: of(loop.high, (at) => 1 / (at * at)),
    high3: of(loop.high, (at) => 1 / (at * at * at)),
    highTable: oscillator === null ? null : of(loop.high, (at) => profileAt(oscillator, at)),
    highFilter: filter > 0 ? of(loop.high, (at) => filterShape(at, f_c, r)) : null,
  }
}

function integrated(f: Float64Array, shapes: Shapes, weight?: Float64Array): ShapeIntegrals {
  const of = (shape: Float64Array | null): number =>
    shape === null ? 0 : powerLawIntegral(f.subarray(0, shape.length), shape, weight)
  return {
    low0: of(shapes.low0),
    low1: of(shapes.low1),
    lowModulator: of(shapes.lowModulator),
    lowTable: of(shapes.lowTable),
    high0: of(shapes.high0),
    high1: of(shapes.high1),
    high2: of(shapes.high2),
    high3: of(shapes.high3),
    highTable: of(shapes.highTable),
    highFilter: of(shapes.highFilter),
  }
}
