import { describe, expect, it } from 'vitest'
import { tankCeiling } from '../../src/clocking/ceiling.ts'
import { bandwidthToLock } from '../../src/clocking/loop/lock.ts'
import { closedLoopOver } from '../../src/clocking/loop/transfer.ts'
import type { Step } from '../../src/derivation/recorder.ts'
import { logSpaced, powerLawIntegral } from '../../src/numeric/power-law.ts'
import type { CaseResult } from '../../src/verdict/result.ts'
import { caseOf, checkOf, clockText, laneText, named } from './scenarios.ts'

describe('lines that count', () => {
  const budget = (allowances: string): Promise<CaseResult> =>
    caseOf(laneText({ jitter_budget: allowances, receiver: '{aperture: 300 fs}' }), true)

  it("law: a preset of a transmitter leaves the receiver's lines out", async () => {
    const { clocking } = await budget('{preset: ieee-802.3cd-kr}')
    expect(clocking!.leftOut).toEqual(["sampler's aperture", 'clock recovery'])
    expect(clocking!.random.map(({ id }) => id)).not.toContain('aperture')
    expect(clocking!.largest.label).not.toMatch(/aperture/)
  })

  it('law: an allowance of the user counts them, and they are by far the largest here', async () => {
    const { clocking } = await budget('{random: 1 ps}')
    expect(clocking!.leftOut).toEqual([])
    expect(clocking!.largest.label).toMatch(/aperture/)
  })

  it.each(['{preset: ieee-802.3cd-kr}', '{random: 1 ps}'])(
    'law: %s: lines add to their sums',
    async (text) => {
      const { clocking } = await budget(text)
      const { random, randomSum_s, bounded, boundedSum_s } = clocking!
      expect(Math.hypot(...random.map(({ value_s }) => value_s)) / randomSum_s).toBeCloseTo(1, 6)
      expect(bounded.reduce((sum, { value_s }) => sum + value_s, 0) / boundedSum_s).toBeCloseTo(1, 9)
    },
  )
})

describe('time to lock', () => {
  const clock = (loop: string): Promise<CaseResult> =>
    caseOf(
      clockText({ loop: `{reference: 100 MHz, ${loop}}`, oscillator: '{kind: LC, range: [9 GHz, 10 GHz]}' }),
    )

  it('law: the bandwidth that is named locks in just that time', async () => {
    const slow = checkOf(await clock('bandwidth: 300 kHz, lock_time: 9 µs'), 'loop.lock_time')!
    expect(slow.verdict).toBe('fail')
    const text = /([\d.]+) MHz locks in time/.exec(slow.reason!)![1]!
    const mended = await clock(`bandwidth: ${text} MHz, lock_time: 9 µs`)
    expect(named(mended, 'clock.loop.lock_time_s') / 9e-6).toBeCloseTo(1, 2)
  })

  it('law: settling goes with the inverse of the bandwidth, charging with its square', () => {
    const times = { search: 1e-6, slew: 4e-6, settle: 3e-6, total: 8e-6 }
    const ratio = bandwidthToLock(times, 1, 8e-6)!
    expect(ratio).toBeCloseTo(1, 12)
    const twice = bandwidthToLock(times, 1, 1e-6 + 4e-6 / 4 + 3e-6 / 2)!
    expect(twice).toBeCloseTo(2, 12)
    expect(bandwidthToLock(times, 1, 1e-6)).toBeNull()
  })

  it('says so when the search alone takes longer', async () => {
    const found = checkOf(await clock('bandwidth: 1 MHz, lock_time: 100 ns'), 'loop.lock_time')!
    expect(found.reason).toMatch(/search among bands alone/)
  })
})

describe('equal numbers of different kinds', () => {
  it('law: a power budget of 25 mW is not taken from a shift of 25 mV', async () => {
    const found = await caseOf(
      clockText({ power_budget: '25 mW', process: '{corner: slow, temperature: [27 °C, 27 °C]}' }),
      true,
    )
    const { steps } = checkOf(found, 'power.total')!
    const required = steps.find(({ yields }) => yields === 'required') as Step
    expect(required.path).toBe('power_budget')
    expect(required.unit).toBe('W')
    const margin = steps.find(({ yields }) => yields === 'margin') as Step
    expect(margin.from.required).toBe(required.id)
  })
})

describe('an oscillator realigned at every edge', () => {
  const h_2 = 1
  const f_ref = 1e8
  const offsets = logSpaced(1e2, 1e12, 200)
  const { low, high } = closedLoopOver(offsets, { kind: 'realigned', f_c: 0.27 * f_ref, r: 1, f_ref })

  // A random walk of phase set to zero at every edge has, averaged over the period, half of what it gathers in one:
  // 2 ∫ h_2/f² |1 − H|² df = 2π² h_2/f_ref; law of diffusion.
  it('law: keeps half of the phase that a random walk gathers in a period', () => {
    const density = offsets.map((f, k) => (2 * h_2 * high[k]!) / (f * f))
    expect(powerLawIntegral(offsets, density) / ((2 * Math.PI ** 2 * h_2) / f_ref)).toBeCloseTo(1, 2)
  })

  it('law: passes of white reference noise what sampling holds, half the reference', () => {
    expect(powerLawIntegral(offsets, low) / (f_ref / 2)).toBeCloseTo(1, 2)
  })

  it('law: at low offsets is the loop of 0.27 of the reference', () => {
    expect(Math.sqrt(1e12 / high[offsets.findIndex((f) => f >= 1e6)]!) / f_ref).toBeCloseTo(0.276, 2)
  })

  it('a fractional ratio is unknown, not free of noise', async () => {
    const ring = { oscillator: '{kind: ring, range: [2 GHz, 2.065 GHz]}' }
    const found = await caseOf(clockText({ ...ring, loop: '{reference: 100 MHz, kind: realigned}' }))
    const jitter = await caseOf(
      clockText({ ...ring, loop: '{reference: 100 MHz, kind: realigned}', jitter_budget: '{random: 20 ps}' }),
    )
    expect(found.results['clock.jitter.rms_s']?.value ?? null).toBeNull()
    expect(checkOf(jitter, 'jitter.random')).toMatchObject({ verdict: 'unknown' })
    expect(checkOf(jitter, 'jitter.random')!.reason).toMatch(/whole multiple/)
  })
})

describe('what a loop leaves', () => {
  it('law: a phase margin that sampling eats up fails', async () => {
    const loop = '{reference: 200 MHz, bandwidth: 17 MHz, phase_margin: 20 deg}'
    const check = checkOf(await caseOf(clockText({ loop })), 'loop.phase_margin')!
    expect(check.available).toBeCloseTo(20 - (360 * 17) / 400, 9)
    expect(check.verdict).toBe('fail')
  })

  it('law: a tone that the receiver follows hardly counts', async () => {
    const tone = (more: string): Promise<CaseResult> =>
      caseOf(
        clockText({
          clock: '{supply_tone: {amplitude: 5 mV, frequency: 200 kHz}}',
          jitter_budget: `{bounded: 2 ps${more}}`,
        }),
        true,
      )
    const of = async (more: string): Promise<number> =>
      (await tone(more)).clocking!.bounded.find(({ id }) => id === 'tone')!.value_s
    expect((await of(', tracking: 4 MHz')) / (await of(''))).toBeCloseTo(0.2 / Math.hypot(0.2, 4), 6)
  })

  it('law: a sub-sampling loop has no divider to add noise', async () => {
    const found = await caseOf(
      clockText({ loop: '{reference: 100 MHz, bandwidth: 1 MHz, detector: sub-sampling}' }),
    )
    expect(named(found, 'clock.jitter.divider_rms_s')).toBe(0)
  })

  it('a preset of a reference clock brings its own tracking', async () => {
    const found = await caseOf(clockText({ jitter_budget: '{preset: pcie-refclk-32g}' }), true)
    expect(found.clocking!.tracking_Hz).toBe(10e6)
  })

  it('law: a measured tank is held to what its stated quality factor allows', async () => {
    const profile = '[[1 kHz, -40 dBc/Hz], [1 MHz, -124 dBc/Hz], [1 GHz, -160 dBc/Hz]]'
    const at = async (more: string): Promise<number> =>
      checkOf(
        await caseOf(
          clockText({
            oscillator: `{kind: LC, range: [10 GHz, 10 GHz], current: 5 mA, phase_noise: ${profile}${more}}`,
          }),
        ),
        'loop.credible',
      )!.required!
    // By hand: 10 log10(2 · 2/π · 64 · 1 mW/(2 · 1.380649e-23 · 300 K)) = 189.9286 dB for γ = 1, Q = 8.
    expect(tankCeiling.run(1, 1.380649e-23, 300, 8, 1e-3, 1)).toBeCloseTo(189.9286, 3)
    const [free, held] = [await at(''), await at(', tank_q: 8')]
    expect(free).toBe(197)
    expect(held).toBeLessThan(193)
    expect(await at(', tank_q: 16')).toBeCloseTo(Math.min(197, held + 20 * Math.log10(2)), 6)
  })
})
