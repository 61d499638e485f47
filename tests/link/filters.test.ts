import { describe, expect, it } from 'vitest'
import { ctleTransfer, noiseFilter, pole, transitionFilter } from '../../src/link/pulse/filters.ts'

const size = ({ re, im }: { readonly re: number; readonly im: number }): number => Math.hypot(re, im)
const dB = (ratio: number): number => 20 * Math.log10(ratio)

describe('filters of a lane', () => {
  // values.json C01: IEEE 802.3bj-2014, 93A-20; tolerance 1e-5.
  it.each([
    [0.5, -0.0169316],
    [1, -3.0103],
    [2, -24.0993],
  ])('published: C01, noise filter at %s of its corner', (x, expected) =>
    expect(dB(size(noiseFilter(x * 20e9, 20e9)))).toBeCloseTo(expected, 4),
  )

  it('published: C01, noise bandwidth over corner', () => {
    let sum = 0
    for (let k = 0; k < 40_000; k++) sum += size(noiseFilter((k + 0.5) * 1e-3, 1)) ** 2 * 1e-3
    expect(sum).toBeCloseTo(Math.PI / 8 / Math.sin(Math.PI / 8), 5)
    expect(sum).toBeCloseTo(1.02617, 5)
  })

  // values.json C02: IEEE 802.3bj-2014, 93A-46; the step response is the normal distribution of σ = 1.6832/2/z(80 %)…
  it('published: C02, corner of the transition filter', () =>
    expect(dB(transitionFilter(0.223033, 1))).toBeCloseTo(-10 * Math.log10(2), 4))

  // values.json C03: IEEE 802.3cd/ck form; tolerance 1e-3 dB.
  it('published: C03, continuous-time equaliser', () => {
    const ctle = { g_DC: -10, g_DC2: -2, f_z: 21.25e9, f_p1: 21.25e9, f_p2: 53.125e9, f_LF: 0.6640625e9 }
    const gain = (f: number): number => dB(size(ctleTransfer(ctle, f)))
    expect(gain(0)).toBeCloseTo(-12, 9)
    expect(gain(26.5625e9)).toBeCloseTo(-2.84912, 4)
    expect(gain(31.9008e9)).toBeCloseTo(-2.74424, 4)
    expect(gain(31.9e9)).toBeGreaterThan(gain(30.5e9))
    expect(gain(31.9e9)).toBeGreaterThan(gain(33.4e9))
  })

  it('law: a pole is 3 dB and 45 degrees at its corner', () => {
    const at = pole(5e9, 5e9)
    expect(at.re).toBeCloseTo(0.5, 12)
    expect(at.im).toBeCloseTo(-0.5, 12)
  })
})
