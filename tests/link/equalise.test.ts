import { describe, expect, it } from 'vitest'
import { folded, linearBound, matchedFilter, salz, symbolPower } from '../../src/link/bounds/salz.ts'
import { lossAt, NEPER, partsOfSplit } from '../../src/link/channel/attenuation.ts'
import { type Disturbance, type Merit, meritOf } from '../../src/link/equalise/merit.ts'
import { ctleAt, settledFor, throughTransmit, transmitTaps } from '../../src/link/equalise/search.ts'
import { noiseFilter, sinc, transitionFilter } from '../../src/link/pulse/filters.ts'
import { PER_SYMBOL, pulseBehind, receivedOver } from '../../src/link/pulse/received.ts'

const dB = (ratio: number): number => 10 * Math.log10(ratio)

const white = (variance: number): Disturbance => ({
  noise: new Float64Array(64),
  white: variance,
  distortion: 0,
  sigma_x2: 1,
  jitter: 0,
  slopes: new Float64Array(0),
})

/** A channel of a few cursors with room for the taps on both sides. */
const cursorsOf = (...cursors: number[]): { readonly pulse: Float64Array; readonly main: number } => {
  const pulse = new Float64Array(160)
  pulse.set(cursors, 80)
  return { pulse, main: 80 }
}
const none = { taps: 0, limit: 0 }

describe('taps of the least mean square', () => {
  const { pulse, main } = cursorsOf(1, 0.9)
  const at = (count: number, taps: number): Merit =>
    meritOf(pulse, main, count, { taps, limit: 10 }, white(0.181))

  // values.json C12: 1 + 0.9 D, σ² = 0.181; J. M. Cioffi, EE379A reader, chapter 3; tolerance 0.02 dB.
  it('published: C12, linear equaliser', () => expect(dB(at(60, 0).ratio)).toBeCloseTo(5.68351, 2))
  it('published: C12, decision feedback', () => expect(dB(at(60, 1).ratio)).toBeCloseTo(8.35731, 2))

  it('law: more taps are never worse, and none beats the bound', () => {
    for (const fed of [0, 1]) {
      const ratios = [1, 4, 7, 10, 16, 25, 40, 60].map((count) => dB(at(count, fed).ratio))
      for (let k = 1; k < ratios.length; k++) expect(ratios[k]!).toBeGreaterThanOrEqual(ratios[k - 1]! - 1e-9)
      expect(ratios.at(-1)!).toBeLessThan(fed === 0 ? 5.684 : 8.358)
    }
  })

  // values.json A30: taps [1, −a]/(1 − a) free a single-pole pulse of interference and raise white noise by
  // (1 + a²)/(1 − a)²; with little noise the least mean square is zero forcing.
  it('published: A30, zero forcing of a single pole', () => {
    const a = 0.25
    const tail = Array.from({ length: 60 }, (_, k) => (1 - a) * a ** k)
    const one = cursorsOf(...tail)
    const { cursors, taps, parts } = meritOf(one.pulse, one.main, 3, none, white(1e-9))
    expect(taps[0]).toBeCloseTo(1, 6)
    expect(taps[1]).toBeCloseTo(-a, 6)
    const gain = parts.noise / 1e-9 / cursors[one.main]! ** 2
    expect(dB(gain)).toBeCloseTo(2.76206, 4)
  })

  it('law: nothing but noise is left of a lone cursor', () => {
    const one = cursorsOf(0.3)
    const { ratio, parts } = meritOf(one.pulse, one.main, 1, none, white(0.01))
    expect(ratio).toBeCloseTo(0.09 / 0.01, 9)
    expect(parts).toEqual({ interference: 0, noise: 0.01, distortion: 0, jitter: 0 })
  })

  it('law: limited feedback leaves interference', () => {
    const { cursors } = meritOf(pulse, main, 1, { taps: 1, limit: 0.5 }, white(0.1))
    expect(cursors[main + 1]).toBeCloseTo(0.4, 12)
  })
})

describe('a receiver over a channel', () => {
  // Invented: 28 GBd over 22 dB at Nyquist, pads of 30 GHz at both ends.
  const f_B = 28e9
  const path = {
    f_B,
    A_v: 0.4,
    T_r: 0.3 / f_B,
    loss: partsOfSplit(22, 0.5, f_B / 2),
    poles: [30e9, 30e9],
    f_r: 0.75 * f_B,
    eta_0: 1.6e-17,
  }
  const received = receivedOver(path)
  const given = { white: 0, distortion: 0, sigma_x2: symbolPower.run(4), jitter: 0 }
  const flat = { ...ctleAt(0, f_B), f_z: f_B, f_p1: f_B, f_p2: 1e6 * f_B }
  const arriving = (f: number): number =>
    ((path.A_v / f_B) *
      Math.abs(sinc(f / f_B)) *
      transitionFilter(f, path.T_r) *
      Math.exp(-lossAt(path.loss, f) * NEPER)) /
    Math.hypot(1, f / 30e9) ** 2
  const spectrum = folded(arriving, f_B, given.sigma_x2, path.eta_0, 20)

  it('law: the pulse adds up to the level that a long run reaches', () => {
    const { samples } = pulseBehind(received, flat)
    const sum = samples.reduce((all, one) => all + one, 0) / PER_SYMBOL
    // The slowest part of the skin effect falls outside the stretch that is kept.
    expect(sum).toBeGreaterThan(0.92 * path.A_v)
    expect(sum).toBeLessThan(path.A_v)
  })

  it('law: nothing arrives before the channel can deliver it', () => {
    const { samples } = pulseBehind(received, flat)
    const peak = Math.max(...samples)
    for (let k = 0; k < 8 * PER_SYMBOL; k++) expect(Math.abs(samples[k]!)).toBeLessThan(0.004 * peak)
  })

  it('law: noise variance is density times noise bandwidth', () => {
    const { noise } = pulseBehind(received, flat)
    expect(noise[0]! / (path.eta_0 * 1.02617 * path.f_r)).toBeCloseTo(1, 3)
  })

  it('law: every receiver stays below the bounds, more of it above less', () => {
    const gains = [0, -3, -6, -9, -12]
    const at = (transmit: number, taps: number, fed: number): number =>
      dB(
        settledFor(
          received,
          { transmitTaps: transmit, gains, receiveTaps: taps, feedback: { taps: fed, limit: 2 } },
          given,
        ).merit.ratio,
      )
    const [bare, sent, fed, long, full] = [at(1, 1, 0), at(3, 1, 0), at(3, 1, 1), at(3, 16, 1), at(3, 40, 12)]
    expect(sent).toBeGreaterThan(bare)
    expect(fed).toBeGreaterThan(sent)
    expect(long).toBeGreaterThan(fed)
    expect(full).toBeGreaterThan(long)
    expect(full).toBeLessThan(dB(salz(spectrum)))
    expect(salz(spectrum)).toBeGreaterThan(linearBound(spectrum))
    expect(salz(spectrum)).toBeLessThan(matchedFilter(spectrum))
    // Baud-spaced taps behind the noise filter come near the bound of a receiver that samples without aliasing.
    expect(full).toBeGreaterThan(dB(salz(spectrum)) - 3)
  })

  it('law: transmit taps never raise the peak', () => {
    for (const [before, after] of [
      [0, 0],
      [-0.1, -0.2],
      [-0.2, 0],
    ] as const) {
      const taps = transmitTaps(before, after)
      expect(Math.abs(taps.before) + taps.main + Math.abs(taps.after)).toBeCloseTo(1, 12)
    }
    const out = throughTransmit(new Float64Array(48).fill(1), transmitTaps(-0.1, -0.2))
    expect(out[PER_SYMBOL + 1]).toBeCloseTo(0.4, 12)
  })

  it('law: the noise filter is the last word on the band', () =>
    expect(Math.hypot(noiseFilter(f_B, path.f_r).re, noiseFilter(f_B, path.f_r).im)).toBeLessThan(0.32))
})
