import { describe, expect, it } from 'vitest'
import { caseOf, checkOf, laneText, named } from '../clocking/scenarios.ts'

const lane = (change: Readonly<Record<string, string | null>>): string =>
  laneText({ loop: null, oscillator: null, examine: '[channel, fec]', ...change })

describe('the channel against any receiver', () => {
  // values.json C13, C14, C16 and C17 stated as scenarios: loss at Nyquist, share of its skin part a √f_N, density.
  it.each([
    ['C13', '53.125 Gb/s', 'PAM-4', '30 dB', '13.28125 GHz', 0.6, 47.2547, 40.122],
    ['C14', '106.25 Gb/s', 'PAM-4', '28 dB', '26.5625 GHz', 0.6, 44.7073, 38.3246],
    ['C16', '212.5 Gb/s', 'PAM-4', '36 dB', '53.125 GHz', 0.5, 40.5884, 31.0739],
    ['C17', '25.78125 Gb/s', 'PAM-2', '35 dB', '12.890625 GHz', 0.6, 48.8776, 39.7779],
  ] as const)('published: %s', async (_, data_rate, modulation, loss, at, skin, matched, best) => {
    const found = await caseOf(
      lane({
        data_rate,
        modulation,
        channel: `{loss: ${loss}, at: ${at}, skin_share: ${skin}}`,
        noise: '{density: 8.2e-18 V^2/Hz}',
        error_ratio: '1e-4',
      }),
    )
    expect(named(found, 'link.loss_nyquist_dB')).toBeCloseTo(Number.parseFloat(loss), 9)
    expect(Math.abs(named(found, 'link.bound.matchedFilter_dB') - matched)).toBeLessThan(0.01)
    expect(Math.abs(named(found, 'link.bound.salz_dB') - best)).toBeLessThan(0.01)
  })

  // values.json C14: margin over PAM-4 at a symbol error ratio of 1e-4 is 19.6932 dB; Q07 for what the decision needs.
  it('published: C14, margin over what the decision needs', async () => {
    const found = await caseOf(
      lane({
        data_rate: '106.25 Gb/s',
        channel: '{loss: 28 dB, at: 26.5625 GHz, skin_share: 0.6}',
        noise: '{density: 8.2e-18 V^2/Hz}',
        error_ratio: '1e-4',
      }),
    )
    expect(named(found, 'link.slicer.required_dB')).toBeCloseTo(18.6315, 3)
    const check = checkOf(found, 'channel.bound')!
    expect(20 * Math.log10(check.margin!)).toBeCloseTo(19.6932, 1)
    expect(check.verdict).toBe('pass')
  })

  it('law: a channel that no receiver could use fails and says so', async () => {
    const found = await caseOf(
      lane({ data_rate: '224 Gb/s', channel: '{loss: 70 dB, at: 56 GHz, skin_share: 0.2}' }),
    )
    const check = checkOf(found, 'channel.bound')!
    expect(check.verdict).toBe('fail')
    expect(check.reason).toMatch(/no receiver/)
  })

  it('law: a noise figure of 0 dB is the noise of the termination', async () => {
    // k_B · 290 K · 100 Ω = 4.0039e-19 V²/Hz; the same density stated gives the same bound.
    const channel = '{loss: 20 dB, at: 14 GHz}'
    const byFigure = await caseOf(lane({ channel, noise: '{figure: 0 dB}' }))
    const byDensity = await caseOf(lane({ channel, noise: '{density: 4.0038821e-19 V^2/Hz}' }))
    const byDefault = await caseOf(lane({ channel }))
    const bound = 'link.bound.matchedFilter_dB'
    expect(named(byFigure, bound)).toBeCloseTo(named(byDensity, bound), 6)
    expect(named(byFigure, bound) - named(byDefault, bound)).toBeCloseTo(10, 9)
  })

  it('a channel that is only a file is unknown, and says so', async () => {
    const found = await caseOf(lane({ channel: '{file: channel.s4p}' }))
    const check = checkOf(found, 'channel.bound')!
    expect(check.verdict).toBe('unknown')
    expect(check.reason).toMatch(/file/)
  })

  it('law: more loss is never better, whichever end of an uncertain loss is judged', async () => {
    const wide = await caseOf(
      lane({ channel: '{loss: {low: 18 dB, typical: 22 dB, high: 26 dB}, at: 14 GHz}' }),
    )
    const bound = async (loss: number): Promise<number> =>
      checkOf(await caseOf(lane({ channel: `{loss: ${loss} dB, at: 14 GHz}` })), 'channel.bound')!.available!
    const [low, high] = [await bound(18), await bound(26)]
    expect(low).toBeGreaterThan(high)
    const { available } = checkOf(wide, 'channel.bound')!
    expect(available).toBeLessThanOrEqual(low)
    expect(available).toBeGreaterThanOrEqual(high)
  })
})

describe('error correction of a lane', () => {
  // values.json Q14: a bit error ratio of 2.4e-4 is a PAM-4 symbol error ratio of 4.8e-4.
  it('independent: Q14, codeword error ratio and the largest bit error ratio', async () => {
    const found = await caseOf(lane({ error_ratio: '4.8e-4', fec: '{code: "RS(544,514)", target: 1e-12}' }))
    const check = checkOf(found, 'fec.codeword')!
    expect(check.available! / 8.15157e-13).toBeCloseTo(1, 3)
    expect(check.margin!).toBeCloseTo(Math.log(8.15157e-13) / Math.log(1e-12), 4)
    expect(named(found, 'fec.bit_error_ratio')).toBeCloseTo(2.4e-4, 12)
    expect(named(found, 'fec.largest_bit_error_ratio') / 2.4334e-4).toBeCloseTo(1, 3)
  })

  it('law: beyond the largest bit error ratio it fails', async () => {
    const found = await caseOf(lane({ error_ratio: '6e-4', fec: '{code: "RS(544,514)"}' }))
    expect(checkOf(found, 'fec.codeword')!.verdict).toBe('fail')
  })

  it('says that bursts are not counted', async () => {
    const found = await caseOf(lane({ fec: '{code: "RS(528,514)"}' }))
    expect(checkOf(found, 'fec.codeword')!.basis).toMatch(/bursts/)
  })
})
