import { describe, expect, it } from 'vitest'
import { caseOf, checkOf, clockText, laneText, named } from './scenarios.ts'

/** How the clock must answer to a change of its scenario. All *law* unless said otherwise. */

const osc = (more: string): Record<string, string> => ({
  oscillator: `{kind: LC, range: [10 GHz, 10 GHz], tail_noise: 0, tank_q: 10, ${more}}`,
})
const inDecibel = (a: number, b: number): number => 20 * Math.log10(a / b)

describe('LC oscillator', () => {
  it('twice the power at the same amplitude, tank impedance halved, moves the 1/f² part by 3 dB', async () => {
    const one = await caseOf(clockText(osc('amplitude: 0.6 V, tank_reactance: 20 Ω')))
    const two = await caseOf(clockText(osc('amplitude: 0.6 V, tank_reactance: 10 Ω')))
    const [a, b] = [one, two].map((given) => named(given, 'clock.jitter.oscillator_rms_s')) as [
      number,
      number,
    ]
    expect(inDecibel(a, b)).toBeCloseTo(10 * Math.log10(2), 6)
    expect(named(two, 'clock.oscillator.power_W') / named(one, 'clock.oscillator.power_W')).toBeCloseTo(2, 9)
  })

  it('the same holds with a noisy tail, whose share does not change', async () => {
    const at = (reactance: number) =>
      caseOf(
        clockText({
          oscillator: `{kind: LC, range: [10 GHz, 10 GHz], tank_q: 10, amplitude: 0.6 V, tank_reactance: ${reactance} Ω}`,
        }),
      )
    const [a, b] = [await at(20), await at(10)].map((given) =>
      named(given, 'clock.jitter.oscillator_rms_s'),
    ) as [number, number]
    expect(inDecibel(a, b)).toBeCloseTo(10 * Math.log10(2), 6)
  })

  it('twice the current of the same tank while it is limited by current moves it by 6 dB', async () => {
    const at = (current: number) => caseOf(clockText(osc(`current: ${current} mA`)))
    const [a, b] = [await at(2), await at(4)].map((given) =>
      named(given, 'clock.jitter.oscillator_rms_s'),
    ) as [number, number]
    expect(inDecibel(a, b)).toBeCloseTo(20 * Math.log10(2), 6)
  })

  it('a bare tail grows with the current, so twice the current then buys less than 6 dB and more than none', async () => {
    const at = (current: number) =>
      caseOf(
        clockText({
          oscillator: `{kind: LC, range: [10 GHz, 10 GHz], tank_q: 10, current: ${current} mA}`,
        }),
      )
    const [a, b] = [await at(2), await at(4)].map((given) =>
      named(given, 'clock.jitter.oscillator_rms_s'),
    ) as [number, number]
    expect(inDecibel(a, b)).toBeGreaterThan(1)
    expect(inDecibel(a, b)).toBeLessThan(6)
  })

  it('beyond the supply limit more current buys nothing', async () => {
    const at = (current: number) => caseOf(clockText(osc(`current: ${current} mA`)))
    const [a, b] = [await at(60), await at(90)].map((given) =>
      named(given, 'clock.jitter.oscillator_rms_s'),
    ) as [number, number]
    expect(inDecibel(a, b)).toBeCloseTo(0, 6)
  })

  it('low supply, low Q and a higher corner of flicker noise each cost jitter', async () => {
    const jitter = async (change: Record<string, string>): Promise<number> =>
      named(await caseOf(clockText(change)), 'clock.jitter.oscillator_rms_s')
    const base = await jitter(osc('cores: 1'))
    expect(await jitter({ ...osc('cores: 1'), supply: '{tolerance: 0 %, voltage: 0.7 V}' })).toBeGreaterThan(
      base,
    )
    expect(await jitter(osc('flicker_corner: 5 MHz'))).toBeGreaterThan(base)
    const low = {
      oscillator: '{kind: LC, range: [10 GHz, 10 GHz], tail_noise: 0, tank_q: 5}',
    }
    expect(await jitter(low)).toBeGreaterThan(1.3 * base)
  })

  it('is never better than its power and quality factor allow, whatever current and amplitude are stated', async () => {
    // M. Garampazzi et al., IEEE JSSC 49(3), 2014: F k_B T f0²/(2 η P Q² Δf²), η = 2/π, F = 1 + γ.
    const contradictory = await caseOf(clockText(osc('current: 0.2 mA, amplitude: 1.2 V')))
    const power = named(contradictory, 'clock.oscillator.power_W')
    const h_2 = (1 * 1.380649e-23 * 300.15 * 1e20) / (2 * (2 / Math.PI) * power * 100)
    const level = 10 * Math.log10(h_2 / 1e12)
    const free = await caseOf(
      clockText({
        ...osc('current: 0.2 mA, amplitude: 1.2 V'),
        loop: '{reference: 100 MHz, bandwidth: 1 kHz}',
      }),
    )
    expect(named(free, 'clock.phaseNoise.at_1MHz_dBc_Hz')).toBeGreaterThan(level)
  })
})

describe('loop', () => {
  it('half the reference frequency raises the floor-limited noise in the band by 3 dB', async () => {
    const at = (reference: number) =>
      caseOf(
        clockText({
          loop: `{reference: ${reference} MHz, bandwidth: 1 MHz, flicker: -200 dBc/Hz, floor: -200 dBc/Hz, reference_floor: -190 dBc/Hz, reference_buffers: 0}`,
        }),
      )
    const [a, b] = [await at(50), await at(100)].map((given) =>
      named(given, 'clock.jitter.detector_rms_s'),
    ) as [number, number]
    // The delay of sampling differs between the two, so the transfers are not quite the same.
    expect(inDecibel(a, b)).toBeGreaterThan(3)
    expect(inDecibel(a, b)).toBeLessThan(3.2)
  })

  it('the optimum lies where the jitter is least, and at the stability limit when a quiet detector asks for more', async () => {
    const best = await caseOf(clockText({ loop: '{reference: 100 MHz}' }))
    const f = named(best, 'clock.loop.bandwidth_Hz')
    for (const factor of [0.7, 1.4]) {
      const other = await caseOf(clockText({ loop: `{reference: 100 MHz, bandwidth: ${f * factor} Hz}` }))
      expect(named(other, 'clock.jitter.rms_s')).toBeGreaterThan(named(best, 'clock.jitter.rms_s'))
      expect(named(other, 'clock.loop.optimum_Hz')).toBeCloseTo(f, -4)
    }
    const quiet = await caseOf(
      clockText({
        oscillator: '{kind: ring, range: [10 GHz, 10 GHz]}',
        loop: '{reference: 50 MHz, detector: sub-sampling}',
      }),
    )
    expect(named(quiet, 'clock.loop.bandwidth_Hz')).toBeCloseTo(5e6 / 1.15, 0)
    expect(checkOf(quiet, 'loop.bandwidth')?.reason).toMatch(/stability limit/)
  })

  it('a bandwidth above a tenth of the reference fails with its reason', async () => {
    const wide = await caseOf(clockText({ loop: '{reference: 100 MHz, bandwidth: 12 MHz}' }))
    expect(checkOf(wide, 'loop.bandwidth')).toMatchObject({
      verdict: 'fail',
      margin: expect.closeTo(10 / 12, 9),
      reason: expect.stringMatching(/not stable/),
    })
  })

  it('a realigned ring has its bandwidth from the reference, no filter, and less jitter than a loop around it', async () => {
    const ring = { oscillator: '{kind: ring, range: [10 GHz, 10 GHz]}' }
    const loop = await caseOf(clockText({ ...ring, loop: '{reference: 100 MHz}' }))
    const realigned = await caseOf(clockText({ ...ring, loop: '{reference: 100 MHz, kind: realigned}' }))
    expect(named(realigned, 'clock.loop.bandwidth_Hz')).toBeCloseTo(27e6, 0)
    expect(realigned.results['clock.loop.C1_F']).toMatchObject({ value: null, reason: expect.any(String) })
    expect(named(realigned, 'clock.jitter.rms_s')).toBeLessThan(named(loop, 'clock.jitter.rms_s'))
  })

  it('a fractional ratio adds its modulator, a whole one does not, and cancelling takes it away', async () => {
    const at = (more: string) => caseOf(clockText({ loop: `{bandwidth: 2 MHz, ${more}}` }))
    expect(named(await at('reference: 100 MHz'), 'clock.jitter.modulator_rms_s')).toBe(0)
    const plain = named(await at('reference: 96 MHz'), 'clock.jitter.modulator_rms_s')
    expect(plain).toBeGreaterThan(0)
    const cancelled = await at('reference: 96 MHz, modulator_cancellation: 20 dB')
    expect(plain / named(cancelled, 'clock.jitter.modulator_rms_s')).toBeCloseTo(10, 6)
  })

  it('measured noise takes the place of the model, and is refused belief when no oscillator of its power is so good', async () => {
    const rows = [1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9]
      .map((f, k) => `[${f} Hz, ${-50 - 20 * k} dBc/Hz]`)
      .join(', ')
    const at = (more: string) =>
      caseOf(clockText({ oscillator: `{kind: LC, range: [10 GHz, 10 GHz], phase_noise: [${rows}]${more}}` }))
    // −110 dBc/Hz at 1 MHz and 1/f² throughout; no flicker, no floor (values.json P25: 104.237 fs, without delay).
    expect(named(await at(''), 'clock.jitter.oscillator_rms_s') * 1e15).toBeCloseTo(104.237, -1)
    expect(checkOf(await at(''), 'loop.credible')).toBeUndefined()
    expect(checkOf(await at(', current: 10 mA'), 'loop.credible')?.verdict).toBe('pass')
    expect(checkOf(await at(', current: 100 µA'), 'loop.credible')).toMatchObject({
      verdict: 'fail',
      reason: expect.stringMatching(/better than any/),
    })
  })

  it('a ring at impossible power fails its budget and says what it would need', async () => {
    const starved = await caseOf(
      clockText({
        oscillator: '{kind: ring, range: [10 GHz, 10 GHz], current: 100 µA}',
        loop: '{reference: 100 MHz}',
        jitter_budget: '{random: 1 ps}',
      }),
    )
    expect(checkOf(starved, 'jitter.random')).toMatchObject({
      verdict: 'fail',
      reason: expect.stringMatching(/the ring makes most of it: .* would need .* mW/),
    })
  })
})

describe('budget', () => {
  it("a preset's allowance, a user's and none all behave", async () => {
    const preset = await caseOf(
      laneText({ loop: '{reference: 156.25 MHz}', jitter_budget: '{preset: ieee-802.3cd-kr}' }),
    )
    // values.json S07: J3u 0.106 UI, J_RMS 0.023 UI, even-odd 0.019 UI; the UI of 28 GBd.
    const UI = 1 / 28e9
    expect(checkOf(preset, 'jitter.tail')?.required).toBeCloseTo(0.106 * UI, 18)
    expect(checkOf(preset, 'jitter.rms')?.required).toBeCloseTo(0.023 * UI, 18)
    expect(checkOf(preset, 'jitter.even_odd')?.required).toBeCloseTo(0.019 * UI, 18)
    const own = await caseOf(
      laneText({
        loop: '{reference: 156.25 MHz}',
        jitter_budget: '{random: 0.01 UI, bounded: 5 ps, total: 0.3 UI}',
      }),
    )
    expect(checkOf(own, 'jitter.random')?.required).toBeCloseTo(0.01 * UI, 18)
    expect(checkOf(own, 'jitter.bounded')?.required).toBe(5e-12)
    expect(checkOf(own, 'jitter.total')?.required).toBeCloseTo(0.3 * UI, 18)
    const none = await caseOf(laneText({ loop: '{reference: 156.25 MHz}' }))
    expect(none.checks.filter(({ subBlock }) => subBlock === 'jitter')).toEqual([])
    expect(none.notExamined.map(({ subBlock }) => subBlock)).toContain('jitter')
    for (const name of [
      'clock.jitter.rms_s',
      'clock.jitter.tracked_rms_s',
      'jitter.random_rms_s',
      'jitter.total_UI',
    ])
      expect(named(none, name)).toBeGreaterThan(0)
  })

  it('an unsure preset decides nothing and says so', async () => {
    const unsure = await caseOf(
      laneText({ loop: '{reference: 156.25 MHz}', jitter_budget: '{preset: ieee-802.3ck-c2c}' }),
    )
    const checks = unsure.checks.filter(({ subBlock }) => subBlock === 'jitter')
    expect(checks.length).toBe(3)
    for (const { verdict, margin, reason } of checks) {
      expect(verdict).toBe('unknown')
      expect(margin).toBeNull()
      expect(reason).toMatch(/UNSURE/)
    }
  })

  it('a budget without a loop is unknown, and total jitter without an error ratio too', async () => {
    const noLoop = await caseOf(clockText({ loop: null, jitter_budget: '{random: 1 ps}' }))
    expect(checkOf(noLoop, 'jitter.random')).toMatchObject({
      verdict: 'unknown',
      reason: expect.stringMatching(/no loop/),
    })
    const noRatio = await caseOf(clockText({ jitter_budget: '{total: 10 ps}' }))
    expect(checkOf(noRatio, 'jitter.total')).toMatchObject({
      verdict: 'unknown',
      reason: expect.stringMatching(/error ratio/),
    })
  })

  it('total jitter is bounded plus 2 Q random at the error ratio (values.json Q02: 9.50685 at 1e-6)', async () => {
    const lane = await caseOf(laneText({ loop: '{reference: 156.25 MHz}' }))
    const total = named(lane, 'jitter.total_s')
    const [random, bounded] = ['jitter.random_rms_s', 'jitter.bounded_pp_s'].map((name) =>
      named(lane, name),
    ) as [number, number]
    expect((total - bounded) / random).toBeCloseTo(9.50685, 4)
  })

  it('what a standard measures at the transmitter leaves out what only the receiver has', async () => {
    const lane = (budget: string) =>
      caseOf(
        laneText({ loop: '{reference: 156.25 MHz}', receiver: '{aperture: 300 fs}', jitter_budget: budget }),
      )
    const own = checkOf(await lane('{random: 1 ps}'), 'jitter.random')
    const measured = checkOf(await lane('{preset: oif-cei-56g-lr}'), 'jitter.random')
    expect(own!.available! ** 2 - measured!.available! ** 2).toBeCloseTo(300e-15 ** 2, 29)
  })

  it('a stricter allowance never improves a verdict', async () => {
    const margin = async (limit: number): Promise<number> =>
      checkOf(await caseOf(clockText({ jitter_budget: `{random: ${limit} fs}` })), 'jitter.random')!.margin!
    const margins = [await margin(400), await margin(200), await margin(100)]
    expect(margins).toEqual([...margins].sort((a, b) => b - a))
  })

  it('tracking takes jitter away, and more of it from a higher corner', async () => {
    const at = async (corner: string): Promise<number> =>
      named(
        await caseOf(
          laneText({ loop: '{reference: 156.25 MHz}', jitter_budget: `{random: 1 ps, tracking: ${corner}}` }),
        ),
        'clock.jitter.tracked_rms_s',
      )
    const [low, high] = [await at('1 MHz'), await at('10 MHz')]
    expect(high).toBeLessThan(low)
    const lane = await caseOf(laneText({ loop: '{reference: 156.25 MHz}' }))
    expect(low).toBeLessThan(named(lane, 'clock.jitter.rms_s'))
  })

  it('full-swing distribution suffers more from its supply than current-mode', async () => {
    const at = async (style: string): Promise<number> =>
      named(await caseOf(clockText({ clock: `{style: ${style}}` })), 'jitter.bounded_pp_s')
    expect(await at('CMOS')).toBeGreaterThan(3 * (await at('CML')))
  })
})

describe('converter-based receivers', () => {
  it("the clock's own jitter is judged as aperture jitter, unless the scenario states that", async () => {
    const lane = (converter: string) =>
      caseOf(
        laneText({
          loop: '{reference: 156.25 MHz}',
          examine: '[loop, jitter, track_and_hold]',
          receiver: `{kind: converter, converter: {${converter}}}`,
        }),
      )
    const own = await lane('full_scale: 0.4 V')
    const check = checkOf(own, 'loop.aperture')!
    // −20 log10(2π f_N σ), f_N = 14 GHz.
    const sigma = named(own, 'jitter.random_rms_s')
    expect(check.available).toBeLessThanOrEqual(-20 * Math.log10(2 * Math.PI * 14e9 * sigma) + 1e-9)
    expect(check.margin).toBeGreaterThan(0)
    const stated = await lane('full_scale: 0.4 V, aperture_jitter: 80 fs')
    expect(checkOf(stated, 'loop.aperture')).toBeUndefined()
    expect(checkOf(stated, 'track_and_hold.aperture')?.margin).toBeGreaterThan(0)
  })
})

describe('clock blocks', () => {
  it('need no data rate, and are judged on jitter, range, power and lock time', async () => {
    const clock = await caseOf(
      clockText({
        oscillator: '{kind: LC, range: [10 GHz, 11 GHz]}',
        loop: '{reference: 100 MHz, lock_time: 50 µs}',
        jitter_budget: '{random: 300 fs}',
        power_budget: '60 mW',
      }),
    )
    const ids = clock.checks.map(({ id }) => id)
    for (const id of ['lc_oscillator.tuning', 'loop.lock_time', 'jitter.random', 'power.total'])
      expect(ids).toContain(id)
    expect(named(clock, 'power.total_W')).toBeGreaterThan(named(clock, 'clock.oscillator.power_W'))
    expect(clock.results['jitter.total_UI']).toMatchObject({ value: null, reason: expect.any(String) })
  })

  it('lock sooner with a wider loop', async () => {
    const at = async (bandwidth: number): Promise<number> =>
      named(
        await caseOf(clockText({ loop: `{reference: 100 MHz, bandwidth: ${bandwidth} kHz}` })),
        'clock.loop.lock_time_s',
      )
    expect(await at(1000)).toBeLessThan(await at(300))
  })

  it('published: no ring at wireline power below 100 fs, the record of conventional loops (limits.json L21)', async () => {
    for (const node of ['P180', 'P65', 'P28', 'F16', 'F7']) {
      const ring = await caseOf(
        clockText({
          nodes: `[${node}]`,
          oscillator: '{kind: ring, range: [5 GHz, 5 GHz]}',
          loop: '{reference: 100 MHz}',
        }),
      )
      expect(named(ring, 'clock.jitter.rms_s'), node).toBeGreaterThan(100e-15)
    }
  })

  it('published: a low reference defeats a low-jitter loop, 403 fs from 500 MHz against 1.22 ps from 31.25 MHz (limits.json L23)', async () => {
    const at = async (reference: number): Promise<number> =>
      named(
        await caseOf(
          clockText({
            nodes: '[P65]',
            oscillator: '{kind: ring, range: [4 GHz, 4 GHz], current: 4 mA}',
            loop: `{reference: ${reference} MHz}`,
          }),
        ),
        'clock.jitter.rms_s',
      )
    // The same loop elsewhere: the ratio is the figure, 3.0; anything from 2 to 5 says the same.
    const ratio = (await at(31.25)) / (await at(500))
    expect(ratio).toBeGreaterThan(2)
    expect(ratio).toBeLessThan(5)
  })
})
