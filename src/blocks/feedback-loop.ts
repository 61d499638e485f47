import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import type { Bench } from './bench.ts'
import { constant, growthOf, REGENERATION } from './decision.ts'
import { peakGain } from './linear-chain.ts'
import { legsLoad, peakingFactor } from './load.ts'

/** The loop of the first decision-feedback tap: what must happen within one unit interval. */

const LOOP = 'derived: setup, integration, regeneration and settling of the sum share one unit interval'
const COMMON = 'common practice, no source'

const SETUP = {
  symbol: 'n_su',
  meaning: 'regeneration time constants of setup',
  unit: '1',
  source: 'common practice, no source: 1 to 2',
  value: 1.5,
}
const INTEGRATE = {
  symbol: 'n_int',
  meaning: 'regeneration time constants of integration',
  unit: '1',
  source: 'common practice, no source: 1.5 current-mode, 6 dynamic',
}
const SUM_DRAINS = {
  symbol: 'n_leg',
  meaning: 'drains on the summing node: the main pair, and all taps together as wide again',
  unit: '1',
  source: COMMON,
  value: 2,
}
const LEVELS = {
  symbol: 'n_leg',
  meaning: 'levels of the modulation: decided cases that the last symbol selects among',
  unit: '1',
  source: 'definition',
  path: 'modulation',
}
const NEXT = {
  symbol: 'phi',
  meaning: 'the selecting multiplexer drives one like stage',
  unit: '1',
  source: COMMON,
  value: 1,
}

/** κ_int = κ_r(1 + c_lay): the regeneration constant, referred to the intrinsic device. kappa_r [1], c_lay [1] → [1]. */
export const intrinsicRegeneration = formula(
  {
    symbol: 'kappa_int',
    meaning: 'regeneration time constant in transit times of the intrinsic device',
    unit: '1',
    source: 'definition: κ_r counts transit times of the device as laid out',
  },
  (kappa_r, c_lay) => kappa_r * (1 + c_lay),
)

/** f_T ≥ [κ_int(n_su + n_int + G_r) + A ℓ ln(1/ε)/β]/(2π UI). kappa_int [1], n_su [1], n_int [1], G_r [1], A [1], l [1], epsilon [1], beta [1], UI [s] → [Hz]. */
export const directLoopDemand = formula(
  { symbol: 'f_T_req', meaning: 'device speed that the direct loop needs', unit: 'Hz', source: LOOP },
  (kappa_int, n_su, n_int, G_r, A, l, epsilon, beta, UI) =>
    (kappa_int * (n_su + n_int + G_r) + (A * l * Math.log(1 / epsilon)) / beta) / (2 * Math.PI * UI),
)

/** f_T ≥ (A ℓ ln 10/β + κ_int)/(2π UI). A [1], l [1] of the multiplexer, beta [1], kappa_int [1], UI [s] → [Hz]. */
export const unrolledLoopDemand = formula(
  {
    symbol: 'f_T_req',
    meaning: 'device speed that the unrolled loop needs',
    unit: 'Hz',
    source:
      'derived: the multiplexer settles to a tenth and its latch catches the result in one unit interval',
  },
  (A, l, beta, kappa_int, UI) => ((A * l * Math.log(10)) / beta + kappa_int) / (2 * Math.PI * UI),
)

/**
 * Device speed [Hz] that the loop needs of a device whose layout share is c_lay [1] and whose latch regenerates with
 * κ_int [1]; without it, with that of a dynamic latch.
 */
export type LoopDemand = (c_lay: number, t: Trace, kappa_int?: number) => number

/** The loop that the scenario asks for. */
export function loopDemand(bench: Bench): LoopDemand {
  return bench.settings.receiver.dfe === 'direct' ? directLoop(bench) : unrolledLoop(bench)
}

function directLoop(bench: Bench): LoopDemand {
  const { settings, node, rates, t } = bench
  const { receiver } = settings
  const A = t.calc(peakGain, receiver.peak_gain)
  const G_r = growthOf(bench)
  const beta = peakingFactor(settings.peaking.receive, t)
  const n_su = constant(SETUP, t)
  const n_int = t.leaf(INTEGRATE, receiver.sampler === 'flip-flop' ? 1.5 : 6)
  const n_leg = constant(SUM_DRAINS, t)
  const kappa_r = constant(REGENERATION, t)
  const { m, d, w } = node.shares
  return (c_lay, trace, own) => {
    const kappa = own ?? trace.calc(intrinsicRegeneration, kappa_r, c_lay)
    const load = trace.calc(legsLoad, receiver.fan_out, A, m, c_lay, n_leg, d, w)
    return trace.calc(
      directLoopDemand,
      kappa,
      n_su,
      n_int,
      G_r,
      A,
      load,
      receiver.dfe_settling,
      beta,
      rates.UI!,
    )
  }
}

function unrolledLoop({ settings, node, rates, t }: Bench): LoopDemand {
  const A = settings.clock.gain
  const beta = peakingFactor(settings.peaking.receive, t)
  const n_leg = t.leaf(LEVELS, rates.levels)
  const phi = constant(NEXT, t)
  const kappa_r = constant(REGENERATION, t)
  const { m, d, w } = node.shares
  return (c_lay, trace, own) => {
    const load = trace.calc(legsLoad, phi, A, m, c_lay, n_leg, d, w)
    const kappa = own ?? trace.calc(intrinsicRegeneration, kappa_r, c_lay)
    return trace.calc(unrolledLoopDemand, A, load, beta, kappa, rates.UI!)
  }
}

/**
 * Data slicers of each clock phase: M − 1 direct, M(M − 1) when each of M cases of the last symbol is decided.
 *
 * @param levels M, levels of the modulation [1]
 * @param unrolled whether the first tap is unrolled
 * @returns slicers a phase [1], the error slicer apart
 */
export function dataSlicers(levels: number, unrolled: boolean): number {
  return (unrolled ? levels : 1) * (levels - 1)
}
