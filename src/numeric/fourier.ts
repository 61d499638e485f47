/**
 * Discrete Fourier transform of length 2^n, radix 2, in place: X_k = Σ x_j e^(−2πi jk/N).
 *
 * Error: relative 1e-15 log2 N. No kept library with this and nothing else was found alive.
 */

/** Twiddle factors and order of a length, made once and used by many transforms. */
export interface Transform {
  readonly length: number
  /** Replaces re and im by their transform. */
  readonly forward: (re: Float64Array, im: Float64Array) => void
  /** Replaces re and im by their inverse transform, 1/N included. */
  readonly inverse: (re: Float64Array, im: Float64Array) => void
}

/**
 * Prepares transforms of a length.
 *
 * @param length a power of two, 2 or more
 * @throws RangeError when it is none
 */
export function transformOf(length: number): Transform {
  if (length < 2 || !Number.isInteger(Math.log2(length))) throw new RangeError(`${length} is no power of two`)
  const cos = new Float64Array(length / 2)
  const sin = new Float64Array(length / 2)
  for (let k = 0; k < length / 2; k++) {
    cos[k] = Math.cos((2 * Math.PI * k) / length)
    sin[k] = Math.sin((2 * Math.PI * k) / length)
  }
  const order = reversed(length)
  const forward = (re: Float64Array, im: Float64Array): void => {
    swapped(re, im, order)
    for (let half = 1; half < length; half *= 2) stage(re, im, half, length / (2 * half), cos, sin)
  }
  return {
    length,
    forward,
    inverse: (re, im) => {
      forward(im, re)
      for (let k = 0; k < length; k++) {
        re[k]! /= length
        im[k]! /= length
      }
    },
  }
}

function reversed(length: number): Uint32Array {
  const bits = Math.log2(length)
  return Uint32Array.from({ length }, (_, k) => {
    let back = 0
    for (let b = 0; b < bits; b++) back |= ((k >> b) & 1) << (bits - 1 - b)
    return back
  })
}

function swapped(re: Float64Array, im: Float64Array, order: Uint32Array): void {
  for (let k = 0; k < order.length; k++) {
    const j = order[k]!
    if (j <= k) continue
    const [a, b] = [re[k]!, im[k]!]
    re[k] = re[j]!
    im[k] = im[j]!
    re[j] = a
    im[j] = b
  }
}

/** Butterflies of one stage: pairs `half` apart. */
function stage(
  re: Float64Array,
  im: Float64Array,
  half: number,
  stride: number,
  cos: Float64Array,
  sin: Float64Array,
): void {
  for (let start = 0; start < re.length; start += 2 * half) {
    for (let k = 0; k < half; k++) {
      const [c, s] = [cos[k * stride]!, sin[k * stride]!]
      const [a, b] = [start + k, start + k + half]
      const tr = re[b]! * c + im[b]! * s
      const ti = im[b]! * c - re[b]! * s
      re[b] = re[a]! - tr
      im[b] = im[a]! - ti
      re[a]! += tr
      im[a]! += ti
    }
  }
}
