import { formula } from '../../derivation/formula.ts'

/** Loss of a channel over frequency, and the phase that goes with it. */

/** Nepers a decibel: ln(10)/20. */
export const NEPER = Math.LN10 / 20

/** IL = IL_at [s √(f/f_at) + (1 − s) f/f_at]. IL_at [dB], s_skin [1], f [Hz], f_at [Hz] → [dB]. */
export const splitLoss = formula(
  {
    symbol: 'IL',
    meaning: 'insertion loss of the channel',
    unit: 'dB',
    source: 'common practice, no source: skin effect by the root of frequency, dielectric by frequency',
  },
  (IL_at, s_skin, f, f_at) => IL_at * (s_skin * Math.sqrt(f / f_at) + (1 - s_skin) * (f / f_at)),
)

/** IL = a0 + a1 √f + a2 f + a4 f². a_0 [dB], a_1 [dB] at f_1, a_2 [dB] at f_1, a_4 [dB] at f_1, f [Hz], f_1 [Hz] → [dB]. */
export const fittedLoss = formula(
  {
    symbol: 'IL',
    meaning: 'fitted insertion loss of the channel',
    unit: 'dB',
    source: 'IEEE 802.3, fitted insertion loss',
  },
  (a_0, a_1, a_2, a_4, f, f_1) => a_0 + a_1 * Math.sqrt(f / f_1) + a_2 * (f / f_1) + a_4 * (f / f_1) ** 2,
)

/** A loss by its parts at 1 GHz: constant, skin, dielectric, square [dB]. */
export interface LossParts {
  readonly constant: number
  readonly skin: number
  readonly dielectric: number
  readonly square: number
}

const ONE_GIGAHERTZ = 1e9

/** Loss [dB] at a frequency [Hz]. */
export function lossAt({ constant, skin, dielectric, square }: LossParts, f: number): number {
  return fittedLoss.run(constant, skin, dielectric, square, f, ONE_GIGAHERTZ)
}

/** Parts of a loss IL_at [dB] at f_at [Hz] of which the share s_skin [1] is skin effect. */
export function partsOfSplit(IL_at: number, s_skin: number, f_at: number): LossParts {
  return {
    constant: 0,
    skin: IL_at * s_skin * Math.sqrt(ONE_GIGAHERTZ / f_at),
    dielectric: IL_at * (1 - s_skin) * (ONE_GIGAHERTZ / f_at),
    square: 0,
  }
}

/** Sum of two losses, part by part. */
export const sumOfLosses = (a: LossParts, b: LossParts): LossParts => ({
  constant: a.constant + b.constant,
  skin: a.skin + b.skin,
  dielectric: a.dielectric + b.dielectric,
  square: a.square + b.square,
})

/**
 * Phase [rad] that makes the loss causal, bulk delay apart: as many radians as nepers for skin effect; for a loss
 * proportional to frequency (2/π) α f ln(f/f_r) with the delay counted at f_r.
 *
 * Source: Kramers–Kronig relations of √(jω) and of a constant loss tangent.
 *
 * @param parts the loss
 * @param f frequency [Hz]
 * @param f_r frequency at which the bulk delay is counted [Hz]
 */
export function causalPhase({ skin, dielectric }: LossParts, f: number, f_r: number): number {
  if (f <= 0) return 0
  const bySkin = -skin * NEPER * Math.sqrt(f / ONE_GIGAHERTZ)
  const byDielectric = (2 / Math.PI) * dielectric * NEPER * (f / ONE_GIGAHERTZ) * Math.log(f / f_r)
  return bySkin + byDielectric
}
