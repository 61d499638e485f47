import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { symbolPower } from '../../src/link/bounds/salz.ts'
import { eyeHeight, openingOf, operatingMargin } from '../../src/link/eye/margin.ts'
import {
  bathtubOverTime,
  bathtubOverVoltage,
  type Decision,
  disturbanceAt,
  feedbackOf,
  signalOf,
  widthOf,
} from '../../src/link/eye/sampled.ts'
import { quantileOf, type Tails, tailsAbove, tailsOf } from '../../src/link/eye/tail.ts'
import { upperTail, upperTailInverse } from '../../src/numeric/normal.ts'

interface Points {
  readonly levels: number
  readonly sigma: number
  readonly cursors: readonly number[]
  readonly points: readonly { readonly x: number; readonly p: number }[]
}
const POINTS = JSON.parse(
  readFileSync(new URL('../outside/fixtures/eye-points.json', import.meta.url), 'utf8'),
) as readonly Points[]

const tailAbove = (tails: Tails, x: number): number => tailsAbove(tails, [x])[0]!

const within = (found: number, expected: number, share: number): void =>
  expect(Math.abs(found / expected - 1)).toBeLessThan(share)

/** A decision on a pulse sampled once a symbol, unless a test has it otherwise. */
const decision = (over: Partial<Decision>): Decision => ({
  samples: Float64Array.of(0.2),
  perSymbol: 1,
  instant: 0,
  fed: new Float64Array(0),
  levels: 4,
  R_LM: 1,
  sigma: 0.004,
  A_DD: 0,
  sigma_RJ: 0,
  ...over,
})

/** Single-pole answer to one symbol, T/τ given, sampled at the end of symbols. */
const singlePole = (T_over_tau: number, length: number): Float64Array => {
  const a = Math.exp(-T_over_tau)
  return Float64Array.from({ length }, (_, k) => (1 - a) * a ** k)
}

describe('tails of the disturbance', () => {
  it('law: noise alone has the normal tail', () => {
    const tails = tailsOf({ levels: 4, cursors: new Float64Array(0), sigma: 1 })!
    for (const x of [0.001, 0.3, 1, 3, 6, 8, 20]) within(tailAbove(tails, x), upperTail(x), 1e-7)
    for (const p of [0.3, 1e-4, 1e-12, 1e-15]) within(quantileOf(tails, p), upperTailInverse(p), 1e-8)
  })

  it('law: both sides are alike', () => {
    const tails = tailsOf({ levels: 2, cursors: Float64Array.of(0.3, -1), sigma: 0.2 })!
    within(tailAbove(tails, -0.7) + tailAbove(tails, 0.7), 1, 1e-12)
  })

  // Direct convolution on an exact grid with SciPy 1.17.1, see tests/outside/makers/eye_points.py.
  it.each(POINTS.map((one, k) => [k, one] as const))('independent: SciPy convolution %i', (_, one) => {
    const tails = tailsOf({ ...one, cursors: Float64Array.from(one.cursors) })!
    for (const { x, p } of one.points) within(tailAbove(tails, x), p, 1e-3)
    for (const { x, p } of one.points.slice(2)) within(quantileOf(tails, p), x, 1e-4)
  })

  it('law: a quantile is exceeded with its probability', () => {
    const cursors = Float64Array.from({ length: 200 }, (_, k) => 0.03 * Math.exp(-k / 12) * Math.cos(1.7 * k))
    const tails = tailsOf({ levels: 4, cursors, sigma: 0.004 })!
    for (const p of [0.3, 1e-2, 1e-6, 1e-15, 1e-25]) within(tailAbove(tails, quantileOf(tails, p)), p, 1e-6)
  })

  it('law: without noise the last of the probability lies at the sum of all cursors', () => {
    const tails = tailsOf({ levels: 2, cursors: Float64Array.of(0.1, 0.04, 0.02), sigma: 0 })!
    within(quantileOf(tails, 1e-12), 0.16, 0.02)
  })

  it('law: many at once are as each alone', () => {
    const cursors = Float64Array.of(0.05, -0.03, 0.02, 0.01)
    const tails = tailsOf({ levels: 4, cursors, sigma: 0.004 })!
    const at = Array.from({ length: 60 }, (_, k) => (k - 20) * 0.004)
    tailsAbove(tails, at).forEach((p, k) => {
      within(p, tailAbove(tails, at[k]!), 1e-6)
    })
  })

  it('refuses what is no tail', () => {
    const tails = tailsOf({ levels: 2, cursors: new Float64Array(0), sigma: 1 })!
    for (const p of [0, 0.5, 1, Number.NaN]) expect(() => quantileOf(tails, p)).toThrow(RangeError)
  })

  it('has none when nothing disturbs', () =>
    expect(tailsOf({ levels: 2, cursors: Float64Array.of(0), sigma: 0 })).toBeNull())
})

describe('operating margin', () => {
  // values.json C06: 3 dB needs these signals over a Gaussian alone.
  it.each([
    [1e-4, 5.25325],
    [1e-5, 6.02432],
    [1e-12, 9.93647],
  ])('published: C06 at %s', (target, ratio) => {
    const { A_s, A_ni } = openingOf(decision({ samples: Float64Array.of(3 * 0.004 * ratio) }), target)
    expect(operatingMargin.run(A_s, A_ni)).toBeCloseTo(3, 4)
  })

  // values.json C07: one residual cursor, Gaussian, and one cursor of jitter; tolerance 0.01 dB.
  it('published: C07 without jitter', () => {
    const { A_s, A_ni } = openingOf(decision({ samples: Float64Array.of(0.2, 0.01), R_LM: 0.95 }), 1e-4)
    expect(A_s * 1e3).toBeCloseTo(63.3333, 4)
    expect(A_ni * 1e3).toBeCloseTo(23.4119, 4)
    expect(operatingMargin.run(A_s, A_ni)).toBeCloseTo(8.64392, 4)
    expect(eyeHeight.run(A_s, A_ni)).toBeCloseTo(2 * (0.0633333 - 0.0234119), 6)
  })

  it('published: C07 with jitter', () => {
    // Two samples a symbol: flanks of ±0.06 V around the residual cursor make its slope 0.12 V/UI, the main one has none.
    const jittered = decision({
      samples: Float64Array.of(0, 0.2, 0, 0.01, 0.12),
      perSymbol: 2,
      instant: 1,
      R_LM: 0.95,
      A_DD: 0.02,
      sigma_RJ: 0.01,
    })
    const { A_s, A_ni } = openingOf(jittered, 1e-4)
    expect(A_ni * 1e3).toBeCloseTo(24.8341, 3)
    expect(operatingMargin.run(A_s, A_ni)).toBeCloseTo(8.13168, 3)
  })

  // values.json A29: amplitude noise of a jittered sine, 0.2 V at 13.28125 GHz, 200 fs rms: slope rms times jitter.
  it('published: A29, jitter through the slope', () => {
    const [A, f, sigma_t, T, n] = [0.2, 13.28125e9, 2e-13, 1 / 26.5625e9, 64]
    // The mean over the sampling phase of a sine of two symbols, one cursor long: σ_v² = slope² σ_t².
    let sum = 0
    for (let phase = 0; phase < 2 * n; phase++) {
      const sample = (k: number): number => A * Math.sin(2 * Math.PI * f * ((k + phase) / n) * T)
      const one = decision({
        samples: Float64Array.of(sample(-1), sample(0), sample(1)),
        perSymbol: n,
        instant: 1,
        levels: 2,
        sigma: 0,
        sigma_RJ: sigma_t / T,
      })
      sum += disturbanceAt(one, 0).sigma ** 2
    }
    within(Math.sqrt(sum / (2 * n)) * 1e3, 2.36028, 1e-3)
  })

  it('published: C05, mean square of the symbols', () => {
    expect(symbolPower.run(2)).toBe(1)
    expect(symbolPower.run(4)).toBeCloseTo(0.555556, 6)
  })
})

describe('peak distortion', () => {
  // values.json A26 and A27: single-pole channel, sampled at the end of the symbol; worst case is the sum of cursors.
  it.each([
    [2, 1, 0.264241],
    [2, 2, 0.729329],
    [2, 3, 0.900426],
    [2, Math.PI, 0.913572],
    [2, 4.398229715, 0.975402],
    [2, 6.283185307, 0.996265],
    [4, 2, 0.458659],
    [4, 3, 0.800852],
    [4, Math.PI, 0.827144],
    [4, 4.398229715, 0.950804],
  ])('published: PAM-%s at T/τ = %s', (levels, T_over_tau, relative) => {
    const one = decision({ samples: singlePole(T_over_tau, 60), levels, sigma: 0 })
    const worst = disturbanceAt(one, 0).cursors.reduce((sum, cursor) => sum + Math.abs(cursor), 0)
    expect((signalOf(one) - worst) * (levels - 1)).toBeCloseTo(relative, 5)
  })

  // values.json A30: feedback of every tap leaves the main cursor alone.
  it('published: A30, feedback leaves 1 − a', () => {
    const samples = singlePole(-Math.log(0.25), 60)
    const fed = feedbackOf(samples, 1, 0, 59, 1)
    const one = decision({ samples, fed, levels: 2, sigma: 0 })
    expect(-20 * Math.log10(signalOf(one))).toBeCloseTo(2.49877, 5)
    expect(Math.max(...disturbanceAt(one, 0).cursors)).toBe(0)
  })

  it('law: limited feedback leaves the rest', () => {
    const fed = feedbackOf(Float64Array.of(1, 0.5, -0.4), 1, 0, 2, 0.3)
    expect([...fed]).toEqual([0.3, -0.3])
  })
})

describe('bathtubs', () => {
  const perSymbol = 16
  const raised = Float64Array.from({ length: 8 * perSymbol }, (_, k) => {
    const t = (k - 4 * perSymbol) / perSymbol
    return Math.abs(t) < 1 ? 0.1 * (1 + Math.cos(Math.PI * t)) : 0
  })
  const one = decision({ samples: raised, perSymbol, instant: 4 * perSymbol, levels: 2, sigma: 0.01 })

  it('law: least at the instant, the same to both sides of an even pulse', () => {
    const { at, ratio } = bathtubOverTime(one)
    expect(at[0]).toBe(-0.5)
    expect(at.at(-1)).toBe(0.5)
    for (let k = 0; k < ratio.length; k++) within(ratio[k]!, ratio.at(-1 - k)!, 1e-6)
    for (let k = 8; k + 1 < ratio.length; k++) expect(ratio[k + 1]!).toBeGreaterThan(ratio[k]!)
  })

  it('law: half a symbol off an even pulse two symbols decide alike', () => {
    // Both halves are h_0/2: beside an equal symbol there is no error, beside another one half of the decisions err.
    within(bathtubOverTime(one).ratio[0]!, 0.25, 1e-9)
  })

  it('law: width at a target grows with the target and is absent when closed', () => {
    const tub = bathtubOverTime(one)
    const [narrow, wide] = [widthOf(tub, 1e-12)!, widthOf(tub, 1e-4)!]
    expect(narrow).toBeGreaterThan(0)
    expect(wide).toBeGreaterThan(narrow)
    expect(widthOf(bathtubOverTime({ ...one, sigma: 0.1 }), 1e-4)).toBeNull()
  })

  it('law: over voltage the threshold at a level errs half the time', () => {
    const { at, ratio } = bathtubOverVoltage(one, 10)
    expect(at[10]).toBe(0)
    within(ratio[0]!, 0.5, 1e-9)
    within(ratio[10]!, bathtubOverTime(one).ratio[8]!, 1e-12)
  })
})

describe('brute force', () => {
  it('independent: 1e7 random symbols err as often as computed', () => {
    const cursors = Float64Array.of(0.2, 0.02, -0.012, 0.009, 0.006, -0.004)
    const sigma = 0.007
    const one = decision({ samples: cursors, sigma })
    const expected = tailAbove(tailsOf(disturbanceAt(one, 0))!, signalOf(one))
    const count = 1e7
    const random = xorshift(20261201)
    let errors = 0
    const line = new Float64Array(cursors.length)
    for (let k = 0; k < count; k++) {
      line.copyWithin(1, 0)
      line[0] = (2 * Math.floor(4 * random())) / 3 - 1
      let noise = sigma * Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random())
      for (let j = 1; j < cursors.length; j++) noise += cursors[j]! * line[j]!
      if (noise > 0.2 / 3) errors++
    }
    // 99.99 % interval of a binomial count.
    expect(errors).toBeGreaterThan(100)
    expect(Math.abs(errors - count * expected)).toBeLessThan(3.9 * Math.sqrt(count * expected))
  })
})

/** Uniform numbers over 0 … 1 by two words of xorshift; G. Marsaglia, Journal of Statistical Software 8(14), 2003. */
function xorshift(seed: number): () => number {
  let x = seed | 0
  return () => {
    x ^= x << 13
    x ^= x >>> 17
    x ^= x << 5
    return (x >>> 0) / 4294967296
  }
}
