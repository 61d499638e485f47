import type { Bench } from '../../blocks/bench.ts'
import type { RouteOutcome } from '../../blocks/sub-block.ts'
import { PLAIN } from '../../derivation/trace.ts'
import { filterRoot, type Sources, sourcesAt } from '../noise/sources.ts'
import { trackingCorner } from '../path/tracking.ts'
import { type LoopIntegrals, loopGrid, loopIntegrals, type ShapeIntegrals } from './integrals.ts'
import { type LineJitters, lineJitters, sumOf } from './line-jitter.ts'
import { bestBandwidth, type Optimum } from './optimum.ts'
import { type LoopProblem, numbersOf } from './problem.ts'
import { bandwidthLimit, guardedBandwidth, LIMIT_RATIO, REALIGNMENT, realignedBandwidth } from './shape.ts'

/** A clock whose loop is closed: bandwidth, integrals, and jitter by source. SI. */
export interface ClockLoop {
  readonly sources: Sources
  readonly problem: LoopProblem
  /** Bandwidth, and √b of the filter. */
  readonly f_c: number
  readonly r: number
  /** Largest bandwidth of a sampled loop; null for a realigned oscillator. */
  readonly f_lim: number | null
  /** Whether the optimum lies at the limit; null when the bandwidth was stated or given by the kind of loop. */
  readonly atLimit: boolean | null
  readonly f_CDR: number | null
  readonly integrals: LoopIntegrals
  /** Jitter by source over the band, and behind the receiver that tracks (the same without one). */
  readonly plain: LineJitters
  readonly judged: LineJitters
  readonly sigma_plain: number
  readonly sigma: number
}

/** No loop: unknown for a reason, or an oscillator whose supply is too low. */
export type NoLoop =
  | { readonly unknown: string }
  | { readonly short: RouteOutcome & { readonly margin: number }; readonly binding: string }

/** Closes the loop of a case at its operating point: the stated bandwidth, or the one of the least jitter. */
export function clockLoopAt(bench: Bench): ClockLoop | NoLoop {
  const { settings, t } = bench
  if (settings.loop === null) return { unknown: 'the scenario states no loop' }
  const sources = bench.once(sourcesAt)
  if (!('oscillator' in sources)) return sources
  const f_CDR = trackingCorner(bench)
  const r = filterRoot(bench)
  const problem = problemOf(bench, sources, r, f_CDR)
  const { f_c, f_lim, atLimit } = bandwidthAt(bench, sources, problem)
  const integrals = integralsAt(bench, problem, f_c)
  const plain = lineJitters(sources, integrals.plain, f_c, PLAIN)
  const noted = notedIntegrals(integrals.tracked ?? integrals.plain, f_c, r, f_CDR, bench)
  const judged = lineJitters(sources, noted, f_c, t)
  return {
    sources,
    problem,
    f_c,
    r,
    f_lim,
    atLimit,
    f_CDR,
    integrals,
    plain,
    judged,
    sigma_plain: sumOf(plain, PLAIN),
    sigma: sumOf(judged, t),
  }
}

function problemOf({ settings }: Bench, s: Sources, r: number, f_CDR: number | null): LoopProblem {
  const { kind, reference, band, modulator_order } = settings.loop!
  const { h_0, h_2, f_fl } = s.oscillator
  const free = s.measured === null ? 1 : 0
  return {
    kind,
    f_ref: reference,
    r,
    delayed: true,
    f_1: band[0],
    f_2: band[1],
    f_CDR,
    low: {
      flat: s.A_ref + s.A_rb + s.A_det + s.A_div,
      flicker: s.a_fl,
      modulator: s.c_mod,
      order: modulator_order,
      table: s.reference,
      scale: s.N_sq,
    },
    high: {
      flat: free * h_0,
      flicker: free * h_0 * f_fl,
      white: free * h_2 + s.p_2,
      flicker3: free * h_2 * f_fl,
      table: s.measured,
      scale: s.scale,
    },
    filter: s.q_R,
  }
}

function bandwidthAt(
  bench: Bench,
  s: Sources,
  problem: LoopProblem,
): Pick<ClockLoop, 'f_c' | 'f_lim' | 'atLimit'> {
  const { t, settings } = bench
  const { kind, reference, bandwidth } = settings.loop!
  if (kind === 'realigned') {
    const k_re = t.leaf(REALIGNMENT, REALIGNMENT.value)
    return { f_c: t.calc(realignedBandwidth, reference, k_re), f_lim: null, atLimit: null }
  }
  const f_lim = t.calc(bandwidthLimit, reference, t.leaf(LIMIT_RATIO, LIMIT_RATIO.value))
  if (bandwidth !== null) return { f_c: bandwidth, f_lim, atLimit: null }
  const f_most = t.calc(guardedBandwidth, f_lim, bench.guard)
  const best = optimumOf(bench, problem, f_most)
  if (best.atLimit) return { f_c: f_most, f_lim, atLimit: true }
  return {
    f_c: t.search(OPTIMUM, best.f_c, t.recording ? givensOf(s, f_most) : undefined),
    f_lim,
    atLimit: false,
  }
}

/** The bandwidth of the least jitter of a problem, up to f_most [Hz]. */
export function optimumOf({ kept }: Bench, problem: LoopProblem, f_most: number): Optimum {
  const find = (): Optimum => bestBandwidth(problem, f_most)
  return kept === undefined ? find() : kept.of('optimum', [...numbersOf(problem), f_most], find)
}

const OPTIMUM = {
  symbol: 'f_c',
  meaning: 'loop bandwidth of the least jitter',
  unit: 'Hz',
  source: 'X. Gao et al., IEEE TCAS-II 56(2), 2009: contributions from inside and outside the band balance',
  residual: 'd sigma/d f_c',
  tolerance: '0.2 %',
}

function givensOf(s: Sources, f_most: number): Readonly<Record<string, number>> {
  const { A_ref, A_rb, A_det, a_fl, A_div, c_mod, p_2, q_R } = s
  const { h_0, h_2, f_fl } = s.oscillator
  const ofOscillator = s.measured === null ? { ...(h_0 > 0 ? { h_0 } : {}), h_2, f_fl } : { s_f0: s.scale }
  const ofReference = s.reference === null ? { A_ref } : { N_sq: s.N_sq }
  return { f_most, ...ofReference, A_rb, A_det, a_fl, A_div, c_mod, ...ofOscillator, p_2, q_R }
}

function integralsAt({ kept }: Bench, problem: LoopProblem, f_c: number): LoopIntegrals {
  if (kept === undefined) return loopIntegrals(problem, f_c)
  const shape = numbersOf(unitSources(problem))
  const grid = kept.of('grid', shape, () => loopGrid(problem))
  return kept.of('integrals', [...shape, f_c], () => loopIntegrals(problem, f_c, grid))
}

/** The same loop with sources of size one: integrals of unit shapes depend on nothing else. */
const unitSources = (problem: LoopProblem): LoopProblem => ({
  ...problem,
  low: { ...problem.low, flat: 0, flicker: 0, scale: 0, modulator: problem.low.modulator > 0 ? 1 : 0 },
  high: { ...problem.high, flat: 0, flicker: 0, white: 0, flicker3: 0, scale: 0 },
  filter: problem.filter > 0 ? 1 : 0,
})

const SHAPES = {
  low0: ['I_l0', '∫|H|² df', 'Hz'],
  low1: ['I_l1', '∫|H|²/f df', '1'],
  lowModulator: ['I_lm', "∫|H|² df over the modulator's shape", 'Hz'],
  lowTable: ['I_lt', '∫|H|² L df over the measured reference', '1'],
  high0: ['I_h0', '∫|1 − H|² df', 'Hz'],
  high1: ['I_h1', '∫|1 − H|²/f df', '1'],
  high2: ['I_h2', '∫|1 − H|²/f² df', '1/Hz'],
  high3: ['I_h3', '∫|1 − H|²/f³ df', '1/Hz^2'],
  highTable: ['I_ht', '∫|1 − H|² L df over the measured oscillator', '1'],
  highFilter: ['I_hf', "∫|1 − H|² df over the filter's shape", '1/Hz'],
} as const

function notedIntegrals(
  integrals: ShapeIntegrals,
  f_c: number,
  r_b: number,
  f_CDR: number | null,
  { t, settings }: Bench,
): ShapeIntegrals {
  if (!t.recording) return integrals
  const { reference, band, modulator_order } = settings.loop!
  const inputs = {
    f_c,
    r_b,
    f_ref: reference,
    f_band_min: band[0],
    f_band_max: band[1],
    ...(f_CDR === null ? {} : { f_CDR }),
  }
  for (const [name, [symbol, meaning, unit]] of Object.entries(SHAPES)) {
    const own = name === 'lowModulator' ? { ...inputs, m_mod: modulator_order } : inputs
    t.kernel(
      {
        ...INTEGRATED,
        symbol,
        unit,
        meaning: f_CDR === null ? meaning : `${meaning}, as far as not tracked`,
      },
      integrals[name as keyof typeof SHAPES],
      own,
    )
  }
  return integrals
}

const INTEGRATED = {
  source:
    'closed loop of third order with half a reference period of delay, or edges that realign the oscillator',
  method: 'piecewise in log-log on 96 points a decade',
  error: '2e-4 relative',
}
