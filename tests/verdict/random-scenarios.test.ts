import { describe, expect, test } from 'vitest'
import type { CaseResult } from '../../src/verdict/result.ts'
import { access, resultOf } from './demos.ts'

/** Laws that hold for any scenario, over seeded random ones that go to the ends of what reading admits. */

/** A small linear congruential generator (Numerical Recipes), so that a found scenario can be found again. */
function generator(seed: number) {
  let state = seed
  const next = (): number => {
    state = (state * 1664525 + 1013904223) % 4294967296
    return state / 4294967296
  }
  const pick = <T>(among: readonly T[]): T => among[Math.floor(next() * among.length)]!
  const log = (from: number, to: number): string => (from * (to / from) ** next()).toPrecision(4)
  const some = (share: number, text: () => string): string => (next() < share ? text() : '')
  return { next, pick, log, some }
}

const YES = ['yes', 'no'] as const

function oscillator({ next, pick, log, some }: ReturnType<typeof generator>): string {
  const low = Number(log(2e8, 6e10))
  const more = [
    some(0.3, () => ', pair: complementary'),
    some(0.3, () => `, tail: ${pick(YES)}`),
    some(0.3, () => `, cores: ${pick([1, 2, 4])}`),
    some(0.3, () => `, tank_q: ${log(1, 60)}`),
    some(0.2, () => `, current: ${log(1e-5, 0.1)} A`),
    some(0.2, () => `, amplitude: ${log(0.03, 4)} V`),
    some(0.2, () => ', overlap: 0, load_share: 0.8'),
    some(0.3, () => `, stages: ${pick([3, 4, 9, 33])}, gain_excess: ${pick([1, 4])}`),
  ].join('')
  const high = (low * (1 + 1.5 * next() ** 2)).toPrecision(4)
  return `oscillator: {kind: ${pick(['LC', 'ring', 'CMOS-ring'])}, range: [${low} Hz, ${high} Hz]${more}}`
}

function receiver({ pick, log, some }: ReturnType<typeof generator>): string {
  const converter = `converter: {switch: ${pick(['boosted', 'complementary', 'nMOS'])}, full_scale: ${log(0.1, 1.6)} V, sub_converters: ${pick([1, 32, 512])}${some(0.5, () => ', aperture_jitter: 100 fs')}}`
  return `receiver: {kind: ${pick(['slicer', 'converter'])}, equaliser: ${pick(['current-mode', 'complementary'])}, stages: ${pick([1, 2, 4])}, peak_gain: ${pick(['0 dB', '3 dB', '12 dB'])}, dfe_taps: ${pick([0, 1])}, dfe: ${pick(['direct', 'unrolled'])}, sampler: ${pick(['dynamic-latch', 'flip-flop'])}, edge_samplers: ${pick(YES)}, interpolator: ${pick(YES)}, linear_swing: {low: 0.02 V, typical: ${log(0.02, 1.2)} V, high: 1.2 V}, ${converter}}`
}

function scenario(seed: number): string {
  const random = generator(seed)
  const { next, pick, log, some } = random
  const link = next() < 0.75
  const peaking = ['none', 'shunt-delay', 'shunt-flat', 'shunt-bridged']
  return [
    `format: 1\ntitle: Random ${seed}\nblock: ${link ? 'link' : 'clock'}\nnodes: [${pick(access.builtInIds())}]`,
    link
      ? `data_rate: ${log(1e8, 9e11)} b/s\nmodulation: ${pick(['PAM-2', 'PAM-4', 'PAM-8'])}\nclocking: ${pick(['full-rate', 'half-rate', 'quarter-rate', 'eighth-rate'])}\nerror_ratio: ${pick(['1e-12', '1e-4', '1e-30', '0.05'])}`
      : '',
    link ? some(0.7, () => oscillator(random)) : oscillator(random),
    some(
      0.3,
      () => `divider: {kind: ${pick(['static', 'injection-locked', 'none'])}, fan_out: ${pick([0, 8])}}`,
    ),
    some(
      0.4,
      () =>
        `supply: {${pick([`voltage: ${log(0.3, 5)} V`, 'use: io', `lift: ${log(0.01, 1)} V`, `core_voltage: ${log(0.3, 3)} V`])}, tolerance: ${pick(['0 %', '20 %'])}, regulator_dropout: ${pick(['0 V', '1 V'])}}`,
    ),
    some(
      0.4,
      () =>
        `process: {temperature: [${pick([-70, -40, 0])} °C, ${pick([0, 105, 170])} °C], corner: ${pick(['slow', 'fast', 'worst'])}}`,
    ),
    some(
      0.4,
      () =>
        `headroom: {clock_swing: ${log(0.05, 1)} V, latch_swing: ${log(0.05, 1)} V, data_swing: ${log(0.05, 1)} V, tail: ${log(0.03, 0.5)} V, latch_stack: ${pick(['three-high', 'tail-less'])}}`,
    ),
    some(
      0.4,
      () => `peaking: {clock: ${pick(peaking)}, transmit: ${pick(peaking)}, receive: ${pick(peaking)}}`,
    ),
    some(
      0.4,
      () =>
        `clock: {style: ${pick(['CML', 'CMOS'])}, gain: ${log(1.05, 6)}, fan_out: ${log(0.2, 16)}, coupling: ${pick(['dc', 'ac'])}}`,
    ),
    some(
      0.5,
      () =>
        `transmitter: {kind: ${pick(['current-mode', 'source-series'])}, swing: ${log(0.05, 3)} V, multiplexer: '${pick(['2:1', '4:1'])}', termination: ${log(20, 200)} Ω}`,
    ),
    some(0.7, () => receiver(random)),
    some(
      0.4,
      () =>
        `pads: {cdm_current: ${log(0.1, 20)} A, extension: ${pick(['none', 'T-coil', 'split-4'])}, return_loss: {at_least: 10 dB, at: ${log(1e9, 1e11)} Hz}}`,
    ),
    some(0.3, () => `demand: {route: ${pick(['rule', 'derived', 'stricter'])}}`),
  ]
    .filter((part) => part !== '')
    .join('\n')
}

/** What is wrong with a case, whatever it was. */
function faultsOf({ checks, results }: CaseResult): readonly string[] {
  const numbers = checks.flatMap(({ id, required, available, margin, typicalMargin, steps }) => [
    ...[required, available, margin, typicalMargin].map((value) => [id, value] as const),
    ...steps.map(({ symbol, value }) => [`${id} ${symbol}`, value] as const),
  ])
  return [
    ...[...numbers, ...Object.entries(results).map(([name, { value }]) => [name, value] as const)]
      .filter(([, value]) => value !== null && !Number.isFinite(value))
      .map(([name, value]) => `${name} is ${value}`),
    ...checks
      .filter(({ margin }) => margin !== null && margin < 0)
      .map(({ id, margin }) => `${id} has margin ${margin}`),
    ...checks
      .filter(({ margin, reason }) => margin === null && !reason)
      .map(({ id }) => `${id} is unknown without a reason`),
    ...Object.entries(results)
      .filter(([, { value, reason }]) => value === null && !reason)
      .map(([name]) => `${name} is null without a reason`),
  ]
}

describe('law: any scenario that can be read is judged in finite numbers, with a reason for every unknown', () => {
  test.each(Array.from({ length: 10 }, (_, k) => k))('seeds %s00 to %s15', async (block) => {
    for (let k = 0; k < 16; k++) {
      const text = scenario(block * 100 + k)
      const { cases } = await resultOf(text, 'random.yaml', true)
      expect(cases.flatMap(faultsOf), text).toEqual([])
    }
  })
})
