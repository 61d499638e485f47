/** Filters of a lane as complex transfers over frequency. */

/** A complex number. */
export interface Complex {
  readonly re: number
  readonly im: number
}

/** a · b. */
export const times = (a: Complex, b: Complex): Complex => ({
  re: a.re * b.re - a.im * b.im,
  im: a.re * b.im + a.im * b.re,
})

const over = (a: Complex, b: Complex): Complex => {
  const d = b.re * b.re + b.im * b.im
  return { re: (a.re * b.re + a.im * b.im) / d, im: (a.im * b.re - a.re * b.im) / d }
}

/**
 * Noise filter of a receiver, Butterworth of fourth order: 1/(1 − 3.414214 x² + x⁴ + j 2.613126 (x − x³)), x = f/f_r.
 *
 * Source: IEEE 802.3bj-2014, 93A-20.
 */
export function noiseFilter(f: number, f_r: number): Complex {
  const x = f / f_r
  return over({ re: 1, im: 0 }, { re: 1 - 3.414214 * x * x + x ** 4, im: 2.613126 * (x - x ** 3) })
}

/** Transition filter of a transmitter of 20–80 % rise T_r [s]: exp(−2 (πf T_r/1.6832)²). Source: IEEE 802.3bj-2014, 93A-46. */
export const transitionFilter = (f: number, T_r: number): number =>
  Math.exp(-2 * ((Math.PI * f * T_r) / 1.6832) ** 2)

/** A continuous-time equaliser by its gains at low frequency [dB], zero, poles and low-frequency stage [Hz]. */
export interface Ctle {
  readonly g_DC: number
  readonly g_DC2: number
  readonly f_z: number
  readonly f_p1: number
  readonly f_p2: number
  readonly f_LF: number
}

/**
 * (10^(g_DC/20) + jf/f_z)(10^(g_DC2/20) + jf/f_LF)/[(1 + jf/f_p1)(1 + jf/f_p2)(1 + jf/f_LF)].
 *
 * Source: IEEE 802.3cd/ck, annex 93A with a low-frequency stage.
 */
export function ctleTransfer({ g_DC, g_DC2, f_z, f_p1, f_p2, f_LF }: Ctle, f: number): Complex {
  const upper = times({ re: 10 ** (g_DC / 20), im: f / f_z }, { re: 10 ** (g_DC2 / 20), im: f / f_LF })
  const lower = times(times({ re: 1, im: f / f_p1 }, { re: 1, im: f / f_p2 }), { re: 1, im: f / f_LF })
  return over(upper, lower)
}

/** A pole at f_p [Hz]: 1/(1 + jf/f_p). */
export const pole = (f: number, f_p: number): Complex => over({ re: 1, im: 0 }, { re: 1, im: f / f_p })

/** sin(πx)/(πx). */
export const sinc = (x: number): number => (x === 0 ? 1 : Math.sin(Math.PI * x) / (Math.PI * x))
