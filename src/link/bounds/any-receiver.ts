import type { Bench } from '../../blocks/bench.ts'
import { LEVELS, slicerRatioFor } from '../../blocks/converter-need.ts'
import {
  ASKED,
  type NamedResult,
  notAsked,
  type Outcome,
  subBlock,
  type Unprepared,
} from '../../blocks/sub-block.ts'
import { formula } from '../../derivation/formula.ts'
import { marginInDecibel } from '../../derivation/margin.ts'
import { lossAt, NEPER, partsOfSplit, splitLoss } from '../channel/attenuation.ts'
import { inputNoise } from '../noise.ts'
import { sinc } from '../pulse/filters.ts'
import { folded, matchedFilter, salz, symbolPower } from './salz.ts'

/** What no receiver exceeds over the channel, whatever it is built from: where it fails, no receiver helps. */

interface Bounds {
  /** Loss at the Nyquist frequency [dB]. */
  readonly IL_N: number
  readonly matched_dB: number
  readonly salz_dB: number
  /** What the decision needs [dB]. */
  readonly required_dB: number
}

/** A_v = V_ppd/2. V_ppd [V] → [V]. */
export const outermostLevel = formula(
  {
    symbol: 'A_v',
    meaning: 'differential amplitude of the outermost levels',
    unit: 'V',
    source: 'definition',
  },
  (V_ppd) => V_ppd / 2,
)

const METHOD = 'mean over 256 frequencies of the Nyquist band, 20 images to each side'
const CIOFFI = 'J. M. Cioffi et al., IEEE Trans. Commun. 43, 1995'

const MATCHED = {
  symbol: 'SNR_MFB',
  meaning: 'signal-to-noise ratio of one symbol alone behind a matched filter',
  unit: 'dB',
  source: CIOFFI,
  method: METHOD,
  error: '0.01 dB',
}
const SALZ = {
  symbol: 'SNR_Salz',
  meaning: 'signal-to-noise ratio that decision feedback of any length reaches, unbiased',
  unit: 'dB',
  source: 'J. Salz, BSTJ 52(8), 1973',
  method: METHOD,
  error: '0.01 dB',
}
const IMAGES = 20
const NO_FILE =
  'the channel is given by a file, which is not evaluated in this version: state loss and frequency beside it'

function prepare(bench: Bench): Bounds | Unprepared {
  const { settings, rates, t, kept } = bench
  const { loss, at, skin_share } = settings.channel!
  if (loss === null || at === null) return { unknown: NO_FILE }
  t.alias('IL_at', 'IL')
  t.alias('f_at', 'f_IL')
  t.alias('f', 'f_N')
  const IL_N = t.calc(splitLoss, loss, skin_share, rates.f_N!, at)
  const A_v = t.calc(outermostLevel, settings.transmitter.swing)
  const eta_0 = inputNoise(bench)
  const sigma_x2 = t.calc(symbolPower, t.leaf(LEVELS, rates.levels))
  const numbers = [loss, at, skin_share, rates.f_B!, A_v, eta_0, sigma_x2]
  const find = (): readonly [number, number] =>
    boundsOf(loss, skin_share, at, rates.f_B!, A_v, eta_0, sigma_x2)
  const [matched, best] = kept === undefined ? find() : kept.of('bounds', numbers, find)
  const inputs = t.recording
    ? { IL: loss, f_IL: at, s_skin: skin_share, f_B: rates.f_B!, A_v, eta_0, sigma_x2 }
    : undefined
  return {
    IL_N,
    matched_dB: t.kernel(MATCHED, matched, inputs),
    salz_dB: t.kernel(SALZ, best, inputs),
    required_dB: slicerRatioFor(rates.levels, settings.error_ratio!, t),
  }
}

/** Matched-filter and Salz bounds [dB] of full-width pulses over a channel in white noise. */
function boundsOf(
  loss: number,
  skin_share: number,
  at: number,
  f_B: number,
  A_v: number,
  eta_0: number,
  sigma_x2: number,
): readonly [number, number] {
  const parts = partsOfSplit(loss, skin_share, at)
  const pulse = (f: number): number =>
    (A_v / f_B) * Math.abs(sinc(f / f_B)) * Math.exp(-lossAt(parts, f) * NEPER)
  const spectrum = folded(pulse, f_B, sigma_x2, eta_0, IMAGES)
  return [10 * Math.log10(matchedFilter(spectrum)), 10 * Math.log10(salz(spectrum))]
}

function boundOutcome({ salz_dB, required_dB }: Bounds, { t }: Bench): Outcome {
  const basis = 'Salz bound over the channel alone, without pads, package, crosstalk or jitter'
  const margin = t.calc(marginInDecibel, salz_dB, required_dB)
  return {
    required: required_dB,
    available: salz_dB,
    margin,
    basis,
    ...(margin < 1 ? { reason: 'no receiver could decide at this error ratio over this channel' } : {}),
  }
}

function results({ IL_N, matched_dB, salz_dB, required_dB }: Bounds): readonly NamedResult[] {
  const named = (name: string, value: number): NamedResult => ({ name: `link.${name}_dB`, value, unit: 'dB' })
  return [
    named('loss_nyquist', IL_N),
    named('bound.matchedFilter', matched_dB),
    named('bound.salz', salz_dB),
    named('slicer.required', required_dB),
  ]
}

/** The channel against any receiver. */
export const anyReceiver = subBlock<Bounds>({
  id: 'channel',
  title: 'Channel: what no receiver exceeds',
  of: ['link'],
  asked: ({ settings }) => (settings.channel === null ? notAsked('the scenario states no channel') : ASKED),
  prepare,
  checks: [
    {
      name: 'bound',
      title: 'Channel: bound of any receiver',
      quantity: 'signal-to-noise ratio at the decision',
      unit: 'dB',
      sense: 'at least',
      evaluate: boundOutcome,
    },
  ],
  results,
})
