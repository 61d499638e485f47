import { formula } from '../../derivation/formula.ts'
import type { Trace } from '../../derivation/trace.ts'
import type { Sources } from '../noise/sources.ts'
import type { ShapeIntegrals } from './integrals.ts'

/** What each source leaves of jitter at the output of the loop. */

const SUM = 'law: densities through the loop, integrated over the band'

/** P = (A_ref + A_rb) I_l0. A_ref [1/Hz], A_rb [1/Hz], I_l0 [Hz] → [1]. */
export const referencePower = formula(
  { symbol: 'P_ref', meaning: 'integrated noise of the reference', unit: '1', source: SUM },
  (A_ref, A_rb, I_l0) => (A_ref + A_rb) * I_l0,
)

/** P = N² I_lt + A_rb I_l0: measured reference. N_sq [1], I_lt [1], A_rb [1/Hz], I_l0 [Hz] → [1]. */
export const measuredReferencePower = formula(
  { symbol: 'P_ref', meaning: 'integrated noise of the measured reference', unit: '1', source: SUM },
  (N_sq, I_lt, A_rb, I_l0) => N_sq * I_lt + A_rb * I_l0,
)

/** P = A_det I_l0 + a_fl I_l1. A_det [1/Hz], I_l0 [Hz], a_fl [1], I_l1 [1] → [1]. */
export const detectorPower = formula(
  { symbol: 'P_det', meaning: 'integrated noise of the detector', unit: '1', source: SUM },
  (A_det, I_l0, a_fl, I_l1) => A_det * I_l0 + a_fl * I_l1,
)

/** P = A_div I_l0. A_div [1/Hz], I_l0 [Hz] → [1]. */
export const dividerPower = formula(
  { symbol: 'P_div', meaning: 'integrated noise of the divider', unit: '1', source: SUM },
  (A_div, I_l0) => A_div * I_l0,
)

/** P = c_mod I_lm. c_mod [1/Hz], I_lm [Hz] → [1]. */
export const modulatorPower = formula(
  { symbol: 'P_mod', meaning: 'integrated noise of the modulator', unit: '1', source: SUM },
  (c_mod, I_lm) => c_mod * I_lm,
)

/** P = h_0 (I_h0 + f_fl I_h1) + h_2 (I_h2 + f_fl I_h3). h_0 [1/Hz], I_h0 [Hz], f_fl [Hz], I_h1 [1], h_2 [Hz], I_h2 [1/Hz], I_h3 [1/Hz²] → [1]. */
export const oscillatorNoisePower = formula(
  { symbol: 'P_osc', meaning: 'integrated noise of the oscillator', unit: '1', source: SUM },
  (h_0, I_h0, f_fl, I_h1, h_2, I_h2, I_h3) => h_0 * (I_h0 + f_fl * I_h1) + h_2 * (I_h2 + f_fl * I_h3),
)

/** P = s_f0 I_ht: measured oscillator. s_f0 [1], I_ht [1] → [1]. */
export const measuredOscillatorPower = formula(
  { symbol: 'P_osc', meaning: 'integrated noise of the measured oscillator', unit: '1', source: SUM },
  (s_f0, I_ht) => s_f0 * I_ht,
)

/** P = p_2 I_h2. p_2 [Hz], I_h2 [1/Hz] → [1]. */
export const supplyPower = formula(
  { symbol: 'P_sup', meaning: "integrated noise of the oscillator's supply", unit: '1', source: SUM },
  (p_2, I_h2) => p_2 * I_h2,
)

/** P = q_R f_c I_hf. q_R [1], f_c [Hz], I_hf [1/Hz] → [1]. */
export const filterPower = formula(
  { symbol: 'P_R', meaning: "integrated noise of the filter's resistor", unit: '1', source: SUM },
  (q_R, f_c, I_hf) => q_R * f_c * I_hf,
)

const jitterOf = (symbol: string, what: string) =>
  formula(
    {
      symbol,
      meaning: `random jitter of the ${what}, rms`,
      unit: 's',
      source: 'definition: both sidebands, phase over angular frequency',
    },
    (P, f_0) => Math.sqrt(2 * P) / (2 * Math.PI * f_0),
  )

/** σ = √(2P)/(2πf_0) by source. P [1], f_0 [Hz] → [s]. */
const JITTER = {
  reference: jitterOf('sigma_ref', 'reference'),
  detector: jitterOf('sigma_det', 'detector'),
  divider: jitterOf('sigma_div', 'divider'),
  modulator: jitterOf('sigma_mod', 'modulator'),
  oscillator: jitterOf('sigma_osc', 'oscillator'),
  supply: jitterOf('sigma_sup', "oscillator's supply"),
  filter: jitterOf('sigma_R', 'loop filter'),
} as const

const NO_MODULATOR = {
  symbol: 'sigma_mod',
  meaning: 'the ratio is whole, so there is no modulator',
  unit: 's',
  source: 'definition',
}
const NO_FILTER = {
  symbol: 'sigma_R',
  meaning: 'a realigned oscillator has no loop filter',
  unit: 's',
  source: 'definition',
}

export type SourceName = keyof typeof JITTER
export const SOURCE_NAMES = Object.keys(JITTER) as readonly SourceName[]
export type LineJitters = Readonly<Record<SourceName, number>>

/** σ² = Σσ_i². sigma_ref [s], sigma_det [s], sigma_div [s], sigma_mod [s], sigma_osc [s], sigma_sup [s], sigma_R [s] → [s]. */
export const loopJitter = formula(
  {
    symbol: 'sigma_pll',
    meaning: 'random jitter of the loop, rms',
    unit: 's',
    source: 'law: independent sources add in square',
  },
  (sigma_ref, sigma_det, sigma_div, sigma_mod, sigma_osc, sigma_sup, sigma_R) =>
    Math.sqrt(
      sigma_ref ** 2 +
        sigma_det ** 2 +
        sigma_div ** 2 +
        sigma_mod ** 2 +
        sigma_osc ** 2 +
        sigma_sup ** 2 +
        sigma_R ** 2,
    ),
)

/**
 * Random jitter of each source behind the loop.
 *
 * @param s densities of the sources
 * @param I integrals of the unit shapes
 * @param f_c bandwidth [Hz]
 * @param t trace
 * @returns rms jitter by source [s]
 */
export function lineJitters(s: Sources, I: ShapeIntegrals, f_c: number, t: Trace): LineJitters {
  const { oscillator: o } = s
  const powers = {
    reference:
      s.reference === null
        ? t.calc(referencePower, s.A_ref, s.A_rb, I.low0)
        : t.calc(measuredReferencePower, s.N_sq, I.lowTable, s.A_rb, I.low0),
    detector: t.calc(detectorPower, s.A_det, I.low0, s.a_fl, I.low1),
    divider: t.calc(dividerPower, s.A_div, I.low0),
    oscillator:
      s.measured === null
        ? t.calc(oscillatorNoisePower, o.h_0, I.high0, o.f_fl, I.high1, o.h_2, I.high2, I.high3)
        : t.calc(measuredOscillatorPower, s.scale, I.highTable),
    supply: t.calc(supplyPower, s.p_2, I.high2),
  }
  const { f_0 } = o
  return {
    reference: t.calc(JITTER.reference, powers.reference, f_0),
    detector: t.calc(JITTER.detector, powers.detector, f_0),
    divider: t.calc(JITTER.divider, powers.divider, f_0),
    modulator:
      s.c_mod === 0
        ? t.leaf(NO_MODULATOR, 0)
        : t.calc(JITTER.modulator, t.calc(modulatorPower, s.c_mod, I.lowModulator), f_0),
    oscillator: t.calc(JITTER.oscillator, powers.oscillator, f_0),
    supply: t.calc(JITTER.supply, powers.supply, f_0),
    filter:
      s.q_R === 0
        ? t.leaf(NO_FILTER, 0)
        : t.calc(JITTER.filter, t.calc(filterPower, s.q_R, f_c, I.highFilter), f_0),
  }
}

/** Jitter of all sources together [s]. */
export const sumOf = (lines: LineJitters, t: Trace): number =>
  t.calc(
    loopJitter,
    lines.reference,
    lines.detector,
    lines.divider,
    lines.modulator,
    lines.oscillator,
    lines.supply,
    lines.filter,
  )
