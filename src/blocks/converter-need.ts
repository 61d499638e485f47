import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { upperTailInverse } from '../numeric/normal.ts'
import type { Bench } from './bench.ts'

/** What a converter-based receiver asks of its converter. */

const PROAKIS = 'J. G. Proakis, Digital Communications, 4th edition 2001, 5.2-45'
const CONVERTER = 'IEEE Std 1241-2010'

/** Levels of the modulation, as a leaf of derivations. */
export const LEVELS = {
  symbol: 'M',
  meaning: 'levels of the modulation',
  unit: '1',
  source: 'definition',
  path: 'modulation',
}

/** P = SER/(2(1 − 1/M)). SER [1] symbol error ratio, M [1] levels → [1]. */
export const tailProbability = formula(
  {
    symbol: 'P_tail',
    meaning: 'probability that noise crosses one threshold',
    unit: '1',
    source: PROAKIS,
  },
  (SER, M) => SER / (2 * (1 - 1 / M)),
)

/** SNR = 10 lg[(M² − 1)/3 · x²]. M [1] levels, x [1] normal quantile → [dB]. */
export const slicerRatio = formula(
  {
    symbol: 'SNR_slicer',
    meaning: 'signal-to-noise ratio that the decision needs',
    unit: 'dB',
    source: PROAKIS,
  },
  (M, x) => 10 * Math.log10(((M ** 2 - 1) / 3) * x ** 2),
)

const QUANTILE = {
  symbol: 'x',
  meaning: 'normal quantile of that probability',
  unit: '1',
  source: 'M. Abramowitz & I. Stegun, Handbook of Mathematical Functions, 1964, 26.2',
  method: 'inverse of the upper tail of the normal distribution, by Newton steps on its logarithm',
  error: '1e-12 relative',
}

/** Slicer SNR [dB] that PAM-M needs at a symbol error ratio. */
export function slicerRatioFor(levels: number, SER: number, t: Trace): number {
  const M = t.leaf(LEVELS, levels)
  const P_tail = t.calc(tailProbability, SER, M)
  const x = t.kernel(QUANTILE, upperTailInverse(P_tail), t.recording ? { P_tail } : undefined)
  return t.calc(slicerRatio, M, x)
}

/** SNR = SNR_slicer + NE + (PAR − 3): of a full-scale sine over all noise. SNR_slicer [dB], NE [dB], PAR [dB] → [dB]. */
export const fullScaleRatio = formula(
  {
    symbol: 'SNR_FS',
    meaning: 'full-scale sine over all noise that the decision allows',
    unit: 'dB',
    source:
      'derived: the equaliser raises the noise, and a signal of this peak lies PAR − 3 dB below a full-scale sine',
  },
  (SNR_slicer, NE, PAR) => SNR_slicer + NE + (PAR - 3),
)

/** SQNR = SNR_FS + QS. SNR_FS [dB], QS [dB] → [dB]. */
export const quantisationRatio = formula(
  {
    symbol: 'SQNR',
    meaning: 'full-scale sine over quantisation noise that is needed',
    unit: 'dB',
    source: 'common practice, no source: quantisation takes a fifth of the noise',
  },
  (SNR_FS, QS) => SNR_FS + QS,
)

/** ENOB = (SQNR − 1.76)/6.02. SQNR [dB] → [1]. */
export const neededResolution = formula(
  { symbol: 'ENOB', meaning: 'effective number of bits that is needed', unit: '1', source: CONVERTER },
  (SQNR) => (SQNR - 1.76) / 6.02,
)

/** SQNR = 6.02 ENOB + 1.76. ENOB [1] → [dB]. */
export const resolutionRatio = formula(
  {
    symbol: 'SQNR',
    meaning: 'full-scale sine over quantisation noise of the stated resolution',
    unit: 'dB',
    source: CONVERTER,
  },
  (ENOB) => 6.02 * ENOB + 1.76,
)

/** SNR = −20 lg(2π f_N σ_j). f_N [Hz], sigma_j [s] → [dB]. */
export const apertureRatio = formula(
  {
    symbol: 'SNR_j',
    meaning: 'full-scale sine at the Nyquist frequency over aperture noise',
    unit: 'dB',
    source: 'definition: jitter times the slope of a sine',
  },
  (f_N, sigma_j) => -20 * Math.log10(2 * Math.PI * f_N * sigma_j),
)

/** f_max = 1/((ENOB + 2) · 8 FO4). ENOB [1], FO4_here [s] → [Hz]. */
export const subConverterLimit = formula(
  {
    symbol: 'f_sub',
    meaning: 'highest rate of a successive-approximation sub-converter',
    unit: 'Hz',
    source: 'estimate: eight fan-out-of-four delays a decision, two decisions for sampling and reset',
  },
  (ENOB, FO4_here) => 1 / ((ENOB + 2) * 8 * FO4_here),
)

/** What the decision asks of the converter; null where neither error target nor slicer SNR is stated. */
export interface ConverterNeed {
  readonly SNR_FS: number | null
  readonly SQNR: number | null
  /** Stated, else needed. */
  readonly ENOB: number | null
}

/** The reason when the need cannot be told. */
export const NO_TARGET = 'the scenario states neither error_ratio nor receiver.converter.slicer_snr'

/** Converter need of a case. */
export function converterNeed({ settings, rates, t }: Bench): ConverterNeed {
  const { slicer_snr, noise_enhancement, peak_to_average, quantisation_share, resolution } =
    settings.receiver.converter
  const { error_ratio } = settings
  if (slicer_snr === null && error_ratio === null) return { SNR_FS: null, SQNR: null, ENOB: resolution }
  const SNR = slicer_snr ?? slicerRatioFor(rates.levels, error_ratio!, t)
  const SNR_FS = t.calc(fullScaleRatio, SNR, noise_enhancement, peak_to_average)
  const SQNR = t.calc(quantisationRatio, SNR_FS, quantisation_share)
  return { SNR_FS, SQNR, ENOB: resolution ?? t.calc(neededResolution, SQNR) }
}
