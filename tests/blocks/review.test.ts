import { describe, expect, it } from 'vitest'
import type { CaseResult } from '../../src/verdict/result.ts'
import { resultOf } from '../verdict/demos.ts'

/** Cases in which a protection or a limit was once overlooked. All *law*. */

const clock = (lines: readonly string[]): string =>
  ['format: 1', 'title: A clock', 'block: clock', ...lines].join('\n')
async function only(text: string): Promise<CaseResult> {
  const { cases } = await resultOf(text, 'a.yaml', false)
  return cases[0]!
}
const check = ({ checks }: CaseResult, id: string) => checks.find((one) => one.id === id)

describe('protection is never overlooked', () => {
  it('full-swing stages on a core supply above the device limit fail', async () => {
    const found = await only(
      clock([
        'nodes: [F16]',
        'oscillator: {kind: CMOS-ring, range: [5 GHz, 5 GHz]}',
        'clock: {style: CMOS}',
        'supply: {core_voltage: 2.5 V}',
      ]),
    )
    expect(found.verdict).toBe('fail')
    expect(check(found, 'ring_oscillator.core_stress')!.margin).toBeLessThan(0.4)
    expect(check(found, 'cmos_clock_buffers.core_stress')!.margin).toBeLessThan(0.4)
  })

  it('a planned amplitude stays inside the peak limit, and a supply that leaves no room for any fails', async () => {
    const at = (supply: string, more = '') =>
      only(
        clock([
          'nodes: [F16]',
          `oscillator: {kind: LC, range: [10 GHz, 10.5 GHz]${more}}`,
          `supply: ${supply}`,
        ]),
      )
    const plain = await at('{tolerance: 5 %}')
    expect(check(plain, 'lc_oscillator.peak_voltage')!.verdict).toBe('pass')
    // V_high + V0/2 of the planned amplitude: 0.84 V + V0/2 ≤ 1.28 V.
    expect(0.84 + plain.results['lc_oscillator.amplitude_V']!.value! / 2).toBeLessThanOrEqual(1.28 + 1e-9)
    const high = await at('{voltage: 1.3 V}')
    expect(check(high, 'lc_oscillator.peak_voltage')!.verdict).toBe('fail')
  })

  it('a stated current swings to the clip of the highest supply where stress is judged', async () => {
    const found = await only(
      clock([
        'nodes: [F16]',
        'oscillator: {kind: LC, range: [10 GHz, 10.5 GHz], current: 40 mA}',
        'supply: {voltage: 0.69 V, tolerance: 5 %}',
      ]),
    )
    // V_high 0.7245 V, tail 0.12 V: V0 = 2 · 0.6045 V, peak 0.7245 + 0.6045 V.
    expect(check(found, 'lc_oscillator.peak_voltage')!.available).toBeCloseTo(1.329, 3)
  })

  it('without any supply nothing passes', async () => {
    const found = await only(
      clock([
        'nodes: [F16]',
        'oscillator: {kind: CMOS-ring, range: [5 GHz, 5 GHz]}',
        'clock: {style: CMOS}',
        'supply: {core_voltage: 0.4 V, ir_drop: 400 mV}',
      ]),
    )
    expect(found.verdict).toBe('fail')
    expect(found.margin).toBeLessThan(0.01)
    expect(Number.isFinite(found.margin)).toBe(true)
  })

  it('headroom does not pass when no supply gives the speed', async () => {
    const found = await only(
      clock([
        'nodes: [F16]',
        'oscillator: {kind: LC, range: [50 GHz, 50 GHz]}',
        'clock: {fan_out: 3}',
        'demand: {route: rule}',
        'supply: {lift: 300 mV}',
        'examine: [clock_buffers]',
      ]),
    )
    const headroom = check(found, 'clock_buffers.headroom')!
    expect(headroom.reason).toMatch(/out of reach at any supply/)
    expect(headroom.margin).toBeLessThan(1)
  })
})

describe('a pad waits for its driver', () => {
  it('and is no better than it when that has no operating point', async () => {
    const found = await only(
      'format: 1\ntitle: A lane\nblock: link\ndata_rate: 28 Gb/s\nmodulation: PAM-2\nclocking: half-rate\nerror_ratio: 1e-12\nnodes: [F7]\ntransmitter: {swing: 1 V}\nexamine: [driver, transmit_pad]\n',
    )
    const driver = check(found, 'driver.speed')!
    expect(driver.margin).toBeLessThan(1)
    expect(check(found, 'transmit_pad.bandwidth')!.margin).toBeLessThan(1)
    expect(found.results['pad.transmit.bandwidth_Hz']).toMatchObject({
      value: null,
      reason: expect.any(String),
    })
  })
})

describe('a direct tap of current-mode flip-flops', () => {
  it('is judged with the regeneration of those latches, slower than that of a dynamic one', async () => {
    const lane = (sampler: string) =>
      only(
        `format: 1\ntitle: A lane\nblock: link\ndata_rate: 10 Gb/s\nmodulation: PAM-2\nclocking: full-rate\nerror_ratio: 1e-12\nnodes: [P65]\ndemand: {route: derived}\nreceiver: {dfe_taps: 1, sampler: ${sampler}}\nexamine: [first_tap]\n`,
      )
    // limits.json L17: at 10 Gb/s in 90 nm the loop needed half-rate clocking and one speculative tap.
    expect(check(await lane('flip-flop'), 'first_tap.speed')!.margin).toBeLessThan(1)
  })
})
