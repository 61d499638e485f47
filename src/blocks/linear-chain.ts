import { formula } from '../derivation/formula.ts'
import { marginInDecibel } from '../derivation/margin.ts'
import type { Trace } from '../derivation/trace.ts'
import type { Settings } from '../scenario/keys/index.ts'
import type { Bench } from './bench.ts'
import { peakingFactor, shrinkFactor } from './load.ts'
import type { Outcome } from './sub-block.ts'

/** What every stage of a linear receive chain is asked to do, whatever it is built from. */

/** A = 10^(A_dB/20). A_dB [dB] → [1]. */
export const peakGain = formula(
  { symbol: 'A', meaning: 'gain of each stage at its peak', unit: '1', source: 'definition' },
  (A_dB) => 10 ** (A_dB / 20),
)

/** g_m R_S/2 = 10^(boost/(20 n)) − 1: each of n stages takes an equal share of the boost. boost_dB [dB], n_st [1] stages → [1]. */
export const degeneration = formula(
  {
    symbol: 'g_mR_S_2',
    meaning: 'source degeneration g_m R_S/2 of each stage',
    unit: '1',
    source: 'S. Gondi & B. Razavi, IEEE JSSC 42(9), 2007: boost 1 + g_m R_S/2',
  },
  (boost_dB, n_st) => 10 ** (boost_dB / (20 * n_st)) - 1,
)

/** A_low = A/(1 + g_m R_S/2). A [1] at the peak, g_mR_S_2 [1] → [1]. */
export const lowFrequencyGain = formula(
  {
    symbol: 'A_low',
    meaning: 'gain of each stage at low frequency',
    unit: '1',
    source: 'S. Gondi & B. Razavi, IEEE JSSC 42(9), 2007',
  },
  (A, g_mR_S_2) => A / (1 + g_mR_S_2),
)

/** η = η_plain, or η_deg when g_m R_S/2 ≥ 1. g_mR_S_2 [1], eta_plain [1], eta_deg [1] → [1]. */
const usableShare = formula(
  {
    symbol: 'eta',
    meaning: 'share of the swing that stays linear',
    unit: '1',
    source: 'common practice, no source: level mismatch 0.95 or better',
  },
  (g_mR_S_2, eta_plain, eta_deg) => (g_mR_S_2 >= 1 ? eta_deg : eta_plain),
)

const PLAIN_SHARE = {
  symbol: 'eta_plain',
  meaning: 'share of the swing that stays linear without degeneration',
  unit: '1',
  source: 'common practice, no source',
}
const DEGENERATED_SHARE = {
  symbol: 'eta_deg',
  meaning: 'share of the swing that stays linear with degeneration',
  unit: '1',
  source: 'common practice, no source',
}

/** Share of the swing that stays linear [1] with a degeneration g_m R_S/2 [1]. */
export function linearShare(degenerated: number, t: Trace): number {
  return t.calc(usableShare, degenerated, t.leaf(PLAIN_SHARE, 0.4), t.leaf(DEGENERATED_SHARE, 0.6))
}

/** f_T ≥ BW A ℓ/(β shrink). BW [Hz] of the chain, A [1], l [1], beta [1], shrink [1] → [Hz]. */
export const chainDemand = formula(
  {
    symbol: 'f_T_req',
    meaning: 'device speed that the linear chain needs',
    unit: 'Hz',
    source: 'derived: stage pole β f_T/(A ℓ), a cascade of n keeps the share `shrink` of it',
  },
  (BW, A, l, beta, shrink) => (BW * A * l) / (beta * shrink),
)

/** Gain, degeneration and bandwidth factors of the chain. */
export interface LinearChain {
  readonly A: number
  readonly n_st: number
  readonly degeneration: number
  readonly beta: number
  readonly shrink: number
}

const NO_DEGENERATION = {
  symbol: 'g_mR_S_2',
  meaning: 'no source degeneration: the scenario states no boost',
  unit: '1',
  source: 'definition',
}

const STAGES = {
  symbol: 'n_st',
  meaning: 'linear stages of the chain',
  unit: '1',
  source: 'scenario',
  path: 'receiver.stages',
}

/** The chain as the scenario asks for it. */
export function linearChain({ receiver, peaking }: Settings, t: Trace): LinearChain {
  const { ctle, stages, peak_gain } = receiver
  const boost = ctle?.boost ?? null
  const n_st = t.leaf(STAGES, stages)
  return {
    A: t.calc(peakGain, peak_gain),
    n_st,
    degeneration: boost === null ? t.leaf(NO_DEGENERATION, 0) : t.calc(degeneration, boost, n_st),
    beta: peakingFactor(peaking.receive, t),
    shrink: shrinkFactor(stages, peaking.receive, t),
  }
}

/** Boost of the chain = 12 dB a stage. n_st [1] stages → [dB]. */
export const reachableBoost = formula(
  {
    symbol: 'boost_max',
    meaning: 'boost that the stages reach together',
    unit: 'dB',
    source: 'common practice, no source: 6 to 12 dB a zero',
  },
  (n_st) => 12 * n_st,
)

const STATED_BOOST = {
  symbol: 'required',
  meaning: 'stated boost',
  unit: 'dB',
  source: 'scenario',
  path: 'receiver.ctle.boost',
}

/** Whether the stages reach the stated boost, and what gain it leaves at low frequency. */
export function boostOutcome({ A, n_st, degeneration }: LinearChain, { settings, t }: Bench): Outcome {
  const required = t.leaf(STATED_BOOST, settings.receiver.ctle!.boost!)
  const available = t.calc(reachableBoost, n_st)
  const A_low = t.calc(lowFrequencyGain, A, degeneration)
  return {
    required,
    available,
    margin: t.calc(marginInDecibel, available, required),
    basis: 'one zero a stage, the boost shared equally; paid for by gain at low frequency',
    ...(t.recording ? { alsoShown: [A_low] } : {}),
  }
}
