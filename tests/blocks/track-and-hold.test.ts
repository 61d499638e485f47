import { describe, expect, it } from 'vitest'
import { benchAt } from '../../src/blocks/bench.ts'
import {
  apertureRatio,
  neededResolution,
  resolutionRatio,
  slicerRatioFor,
} from '../../src/blocks/converter-need.ts'
import { followerDemand } from '../../src/blocks/hold-buffer.ts'
import { noiseCapacitance, samplingSwitch, switchDemand } from '../../src/blocks/sampling-switch.ts'
import { trackAndHold } from '../../src/blocks/track-and-hold.ts'
import { PLAIN } from '../../src/derivation/trace.ts'
import { BOLTZMANN, typicalPoint } from '../../src/device/conditions.ts'
import { caseOf, nodeOf, type Overrides, outcomeOf, resultsOf, walkAll, worstMargin } from './bench.ts'

const converter = (more: Overrides = {}, over: Overrides = {}): Overrides => ({
  receiver: { kind: 'converter', converter: more },
  ...over,
})
const margin = (over: Overrides, name = 'speed') => worstMargin(caseOf(28, over), trackAndHold, name)

describe('what the decision asks of the converter', () => {
  // values.json Q07: Proakis 2001, 5.2-45 inverted; tolerance 0.01 dB.
  it.each([
    [2, [11.4086, 12.5982, 13.5401, 14.9824, 16.9446, 17.9979]],
    [4, [18.6315, 19.7686, 20.6771, 22.0793, 24.0036, 25.0422]],
    [8, [24.9496, 26.0679, 26.9644, 28.3519, 30.2622, 31.2953]],
  ] as const)('published: slicer SNR of PAM-%i as Q07 states', (levels, ratios) => {
    const targets = [1e-4, 1e-5, 1e-6, 1e-8, 1e-12, 1e-15]
    targets.forEach((SER, k) => {
      expect(Math.abs(slicerRatioFor(levels, SER, PLAIN) - ratios[k]!)).toBeLessThan(0.01)
    })
  })

  // values.json A22: converter tutorial, IEEE Std 1241-2010; tolerance 0.01.
  it('published: resolution and quantisation ratio as A22 states', () => {
    const ratios = [31.8639, 37.8845, 43.9051, 49.9257]
    ratios.forEach((ratio, k) => {
      expect(Math.abs(resolutionRatio.run(5 + k) - ratio)).toBeLessThan(0.01)
    })
    expect(Math.abs(neededResolution.run(44) - 7.01661)).toBeLessThan(0.01)
  })

  // values.json A21: converter tutorial; tolerance 0.05 dB.
  it.each([
    [1e8, 1e-13, 84.0364],
    [1e9, 1e-13, 64.0364],
    [5e9, 1e-13, 50.057],
    [1e10, 1e-13, 44.0364],
    [28e9, 1e-13, 35.0932],
    [1e9, 1e-12, 44.0364],
  ])('published: aperture ratio at %s Hz and %s s as A21 states', (f, sigma, ratio) => {
    expect(Math.abs(apertureRatio.run(f, sigma) - ratio)).toBeLessThan(0.05)
  })

  it('independent: the need of PAM-4 at 1e-6, summed by hand: 20.68 + 3 + 6 + 7 dB are 5.80 bits', () => {
    const found = resultsOf(caseOf(28, converter()), trackAndHold)
    expect(found['track_and_hold.full_scale_over_noise_dB']!.value).toBeCloseTo(29.68, 2)
    expect(found['track_and_hold.resolution_bits']!.value).toBeCloseTo((36.677 - 1.76) / 6.02, 3)
  })
})

describe('the sampling capacitor and switch', () => {
  // values.json A16: differential kT/C noise √(2kT/C) at 300 K; 10 fF a side give 643.58 µV single-ended.
  it('published: the capacitor leaves differential kT/C noise at a quarter of quantisation noise', () => {
    const C = noiseCapacitance.run(BOLTZMANN.value, 300, 7, 0.5)
    const noise = 643.58e-6 ** 2 * (1e-14 / C) * 2
    expect(Math.abs(noise / ((0.5 / 2 ** 7) ** 2 / 12 / 4) - 1)).toBeLessThan(1e-4)
  })

  // values.json A17: 50 Ω at 300 K give 0.910159 nV/√Hz; over the noise bandwidth 1/(4RC) that is kT/C.
  it('published: the same noise from the resistance in front of the capacitor', () => {
    const C = noiseCapacitance.run(BOLTZMANN.value, 300, 7, 0.5)
    const noise = (2 * 0.910159e-9 ** 2) / (4 * 50 * C)
    expect(Math.abs(noise / ((0.5 / 2 ** 7) ** 2 / 48) - 1)).toBeLessThan(1e-4)
  })

  it('independent: at the demanded cut-off the capacitor settles with a pole at 1.5 times Nyquist', () => {
    const [f_N, chi, C_s] = [14e9, 0.3, 1e-13]
    const R = 1 / (2 * Math.PI * switchDemand.run(f_N, chi) * chi * C_s)
    expect(1 / (2 * Math.PI * R * C_s) / f_N).toBeCloseTo(1.5, 12)
  })

  it('law: boosting beats a plain switch, and a lower input eases both', () => {
    const cutOff = (more: Overrides, V_in = 0.25) =>
      samplingSwitch(benchAt(caseOf(28, converter(more)), typicalPoint(300), PLAIN), V_in)
    const [boosted, plain, complementary] = ['boosted', 'nMOS', 'complementary'].map((kind) =>
      cutOff({ switch: kind }),
    )
    expect(boosted).toBeGreaterThan(plain!)
    expect(complementary).toBeGreaterThan(0)
    for (const kind of ['boosted', 'nMOS']) {
      expect(cutOff({ switch: kind }, 0.15)).toBeGreaterThan(cutOff({ switch: kind }))
    }
  })

  it('independent: a follower of the demanded speed has its pole at 1.5 times Nyquist', () => {
    const [f_N, phi, d, w, C_gg] = [14e9, 2.6, 0.6, 0.35, 1e-15]
    const g_m = 2 * Math.PI * followerDemand.run(f_N, phi, d, w) * C_gg
    expect(g_m / (2 * Math.PI * (phi + d + w) * C_gg) / f_N).toBeCloseTo(1.5, 12)
  })
})

describe('checks of the track-and-hold', () => {
  it('law: a higher rate lowers speed, switch and rate margins; more sub-converters relax the rate', () => {
    for (const name of ['speed', 'switch', 'rate']) {
      expect(margin(converter({}, { data_rate: 112e9 }), name)).toBeLessThan(margin(converter(), name))
    }
    expect(margin(converter({ sub_converters: 64 }), 'rate') / margin(converter(), 'rate')).toBeCloseTo(2, 12)
    const node = nodeOf(28)
    const light = { ...node, nmos: { ...node.nmos, C_ext: 0.5 * node.nmos.C_ext } }
    expect(worstMargin(caseOf(light, converter()), trackAndHold, 'speed')).toBeGreaterThan(
      margin(converter()),
    )
  })

  it('law: more resolution passes its own check better and leaves less rate', () => {
    const at = (resolution: number, name: string) => margin(converter({ resolution }), name)
    expect(at(7, 'resolution') / at(6, 'resolution')).toBeCloseTo(10 ** (6.02 / 20), 9)
    expect(at(7, 'rate')).toBeLessThan(at(6, 'rate'))
  })

  it('law: jitter ten times as large costs 20 dB', () => {
    const at = (aperture_jitter: number) => margin(converter({ aperture_jitter }), 'aperture')
    expect(at(1e-13) / at(1e-12)).toBeCloseTo(10, 9)
  })

  it('judges a stated sampling jitter, and says what is unknown without a target', () => {
    const loop = converter({}, { loop: { reference: 156.25e6 } })
    const asked = (over: Overrides) =>
      trackAndHold.checks.find(({ name }) => name === 'aperture')!.asked!(caseOf(28, over))
    // The jitter of a loop is judged where the clock is: see the loop.
    expect([asked(converter()), asked(loop), asked(converter({ aperture_jitter: 1e-13 }))]).toEqual([
      false,
      false,
      true,
    ])
    const rate = outcomeOf(caseOf(28, converter({}, { error_ratio: null })), trackAndHold, 'rate')
    expect([rate.margin, rate.reason]).toEqual([null, expect.stringMatching(/error_ratio/)])
    const named = resultsOf(caseOf(28, converter({}, { error_ratio: null })), trackAndHold)
    expect(named['track_and_hold.resolution_bits']).toMatchObject({
      value: null,
      reason: expect.stringMatching(/error/),
    })
  })

  it('is asked of converter-based receivers', () => {
    expect(trackAndHold.asked(caseOf(28)).yes).toBe(false)
    expect(trackAndHold.asked(caseOf(28, converter())).yes).toBe(true)
  })

  it.each([
    ['passing', 28, converter({ aperture_jitter: 1e-13, resolution: 6 })],
    ['failing', 180, converter({ aperture_jitter: 1e-12, resolution: 4 }, { data_rate: 112e9 })],
    ['nMOS switch', 16, converter({ switch: 'nMOS' })],
    ['complementary switch', 16, converter({ switch: 'complementary', slicer_snr: 22 })],
    ['no operating point', 28, converter({}, { supply: { voltage: 0.4 } })],
    ['no target', 28, converter({ resolution: 6 }, { error_ratio: null, supply: { voltage: 1.2 } })],
  ] as const)('evaluates with mathjs: %s', (_, nm, settings) => {
    const given = caseOf(nm, settings)
    const unknown = settings.error_ratio === null
    if (unknown) {
      expect(outcomeOf(given, trackAndHold, 'resolution').margin).toBeNull()
      return
    }
    expect(walkAll(given, trackAndHold)).toBeGreaterThan(100)
  })
})
