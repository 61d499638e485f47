import { type Transform, transformOf } from '../../numeric/fourier.ts'
import { causalPhase, type LossParts, lossAt, NEPER } from '../channel/attenuation.ts'
import {
  type Complex,
  type Ctle,
  ctleTransfer,
  noiseFilter,
  pole,
  sinc,
  times,
  transitionFilter,
} from './filters.ts'

/** The pulse of one symbol as it arrives, and the noise beside it. */

/** What a symbol passes before any choice of equaliser. SI. */
export interface Path {
  readonly f_B: number
  /** Differential amplitude of the outermost levels at the transmitter [V]. */
  readonly A_v: number
  /** 20–80 % transition time [s]. */
  readonly T_r: number
  readonly loss: LossParts
  /** Poles of the pads [Hz]; empty when the stated loss holds them. */
  readonly poles: readonly number[]
  /** Corner of the receiver's noise filter [Hz]. */
  readonly f_r: number
  /** One-sided noise density at its input [V²/Hz]. */
  readonly eta_0: number
}

/** Samples a symbol, and symbols that a pulse is followed over. */
export const PER_SYMBOL = 16
const SYMBOLS = 256
/** Where in the window the bulk delay puts the pulse, in symbols. */
const DELAY = 24

/** Spectra of a path on the grid of the transform, before the continuous-time equaliser. */
export interface Received {
  readonly path: Path
  readonly transform: Transform
  readonly f: Float64Array
  readonly re: Float64Array
  readonly im: Float64Array
  /** |H_r|² of the noise filter. */
  readonly noise: Float64Array
}

/** Prepares the spectra of a path. */
export function receivedOver(path: Path): Received {
  const length = PER_SYMBOL * SYMBOLS
  const step = path.f_B / SYMBOLS
  const f = Float64Array.from({ length: length / 2 + 1 }, (_, k) => k * step)
  const [re, im] = [new Float64Array(f.length), new Float64Array(f.length)]
  for (let k = 0; k < f.length; k++) {
    const at = arriving(path, f[k]!)
    re[k] = at.re
    im[k] = at.im
  }
  return {
    path,
    transform: transformOf(length),
    f,
    re,
    im,
    noise: f.map((at) => {
      const { re, im } = noiseFilter(at, path.f_r)
      return re * re + im * im
    }),
  }
}

/** Spectrum of the pulse at the equaliser's input: symbol, transition, channel, pads, noise filter, bulk delay. */
function arriving({ f_B, A_v, T_r, loss, poles, f_r }: Path, f: number): Complex {
  const size = A_v * sinc(f / f_B) * transitionFilter(f, T_r) * Math.exp(-lossAt(loss, f) * NEPER)
  const angle = causalPhase(loss, f, f_B / 2) - (2 * Math.PI * f * DELAY) / f_B
  let at: Complex = { re: size * Math.cos(angle), im: size * Math.sin(angle) }
  at = times(at, noiseFilter(f, f_r))
  for (const one of poles) at = times(at, pole(f, one))
  return at
}

/** A pulse sampled PER_SYMBOL times a symbol, and the noise variance [V²] and autocorrelation that go with it. */
export interface Pulse {
  readonly samples: Float64Array
  /** Noise autocorrelation at whole symbols [V²]; the first is its variance. */
  readonly noise: Float64Array
}

/** Longest lag of the noise that equalisers ask for. */
const LAGS = 64

/** The pulse behind a continuous-time equaliser. */
export function pulseBehind({ path, transform, f, re, im, noise }: Received, ctle: Ctle): Pulse {
  const { length } = transform
  const [pr, pi] = [new Float64Array(length), new Float64Array(length)]
  const [nr, ni] = [new Float64Array(length), new Float64Array(length)]
  for (let k = 0; k < f.length; k++) {
    const H = ctleTransfer(ctle, f[k]!)
    const [a, b] = [re[k]! * H.re - im[k]! * H.im, re[k]! * H.im + im[k]! * H.re]
    const power = noise[k]! * (H.re * H.re + H.im * H.im)
    const real = k === 0 || 2 * k === length
    pr[k] = a
    pi[k] = real ? 0 : b
    nr[k] = power
    if (real) continue
    pr[length - k] = a
    pi[length - k] = -b
    nr[length - k] = power
  }
  transform.inverse(pr, pi)
  transform.inverse(nr, ni)
  // Spectra are in units of one symbol, P/T: a sample is Σ P df = PER_SYMBOL times the mean that the inverse gives.
  for (let k = 0; k < length; k++) pr[k]! *= PER_SYMBOL
  // ∫ S df over both sides, one-sided density halved, at whole symbols.
  const scale = (path.eta_0 / 2) * length * (path.f_B / SYMBOLS)
  const lags = new Float64Array(LAGS)
  for (let lag = 0; lag < LAGS; lag++) lags[lag] = scale * nr[lag * PER_SYMBOL]!
  return { samples: cut(pr), noise: lags }
}

/** Symbols before and after the peak that a pulse is kept over. */
const KEPT = { before: 14, after: 78 } as const

/** The stretch around the peak: what lies further out is too small to matter. */
function cut(samples: Float64Array): Float64Array {
  let peak = 0
  for (let k = 0; k < samples.length; k++) if (samples[k]! > samples[peak]!) peak = k
  const from = Math.max(0, peak - KEPT.before * PER_SYMBOL)
  return samples.slice(from, Math.min(samples.length, peak + KEPT.after * PER_SYMBOL))
}
