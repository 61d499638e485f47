import { formula } from '../../derivation/formula.ts'

/** Noise that enters at the phase detector. */

const NORMALISED = 'normalised-floor convention, common practice'

/** L_det = L_n + 20 log10 N + 10 log10(f_ref/B_1). L_n [dBc/Hz], N [1], f_ref [Hz], B_1 [Hz] → [dBc/Hz]. */
export const detectorFloor = formula(
  { symbol: 'L_det', meaning: 'in-band floor of the detector', unit: 'dBc/Hz', source: NORMALISED },
  (L_n, N, f_ref, B_1) => L_n + 20 * Math.log10(N) + 10 * Math.log10(f_ref / B_1),
)

/** a_fl = A (f_0/f_n0)² f_n1: density times the offset. A [1/Hz], f_0 [Hz], f_n0 [Hz] carrier and f_n1 [Hz] offset of the convention → [1]. */
export const detectorFlicker = formula(
  {
    symbol: 'a_fl',
    meaning: "density times the offset of the detector's flicker noise",
    unit: '1',
    source: 'normalised-flicker convention, common practice: at 10 kHz from a carrier of 1 GHz',
  },
  (A, f_0, f_n0, f_n1) => A * (f_0 / f_n0) ** 2 * f_n1,
)

export const CARRIER = {
  symbol: 'f_n0',
  meaning: 'carrier of the normalised-flicker convention',
  unit: 'Hz',
  source: 'definition',
  value: 1e9,
}
export const OFFSET = {
  symbol: 'f_n1',
  meaning: 'offset of the normalised-flicker convention',
  unit: 'Hz',
  source: 'definition',
  value: 1e4,
}

const floor = (kind: string, value: number) => ({
  symbol: 'L_n',
  meaning: `normalised floor of a ${kind} detector`,
  unit: 'dBc/Hz',
  source: 'common practice, no source',
  value,
})
const flicker = (kind: string, value: number) => ({
  symbol: 'L_nf',
  meaning: `normalised flicker noise of a ${kind} detector`,
  unit: 'dBc/Hz',
  source: 'common practice, no source',
  value,
})

/** Normalised floors and flicker noise by kind of detector. */
export const DETECTORS = {
  'charge-pump': { floor: floor('charge-pump', -228), flicker: flicker('charge-pump', -120) },
  sampling: { floor: floor('sampling', -240), flicker: flicker('sampling', -125) },
  'sub-sampling': { floor: floor('sub-sampling', -247), flicker: flicker('sub-sampling', -130) },
} as const

/** c_mod = (2π)²/(12 f_ref) 10^(−X/10): coefficient of the modulator's shape. f_ref [Hz], X_mod [dB] → [1/Hz]. */
export const modulatorNoise = formula(
  {
    symbol: 'c_mod',
    meaning: "coefficient of the modulator's noise",
    unit: '1/Hz',
    source: 'derived: quantisation of one oscillator period, white, shaped by the order of the modulator',
  },
  (f_ref, X_mod) => ((2 * Math.PI) ** 2 / (12 * f_ref)) * 10 ** (-X_mod / 10),
)
