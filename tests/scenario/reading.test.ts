import { describe, expect, it } from 'vitest'
import { loadScenario } from '../../src/nodes/load.ts'
import type { Provenance, Scenario } from '../../src/scenario/checked.ts'
import { readScenario } from '../../src/scenario/read.ts'
import { starters } from '../../src/scenario/starters.ts'
import { ALL_CLASSES, accessTo, demo, faultsOf, link } from './scenarios.ts'

async function scenario(text: string, files: Readonly<Record<string, string>> = {}): Promise<Scenario> {
  const read = await readScenario(text, 'a.yaml', accessTo(files))
  if (!read.ok) throw new Error(JSON.stringify(read.faults))
  return read.value
}
const at = (given: Scenario, path: string, option = 0): Provenance =>
  given.options[option]!.provenance.find((one) => one.path === path)!

describe('values are held in SI', () => {
  it('law: units are converted on the way in', async () => {
    const text = link({
      oscillator: '{kind: LC, range: [13 GHz, 15000 MHz]}',
      loop: '{reference: 156.25 MHz, floor: −228 dBc/Hz}',
      process: '{temperature: [-40 °C, 398.15 K]}',
      jitter_budget: '{random: 150 fs, bounded: 0.15 UI, total: 9 ps}',
      guard: '15 %',
    })
    const { settings } = (await scenario(text)).options[0]!
    expect(settings.data_rate).toBe(56e9)
    expect(settings.oscillator?.range).toEqual([13e9, 15e9])
    expect(settings.loop?.floor).toBe(-228)
    expect(settings.process.temperature).toEqual([233.15, 398.15])
    expect(settings.jitter_budget).toMatchObject({
      random: 150e-15,
      bounded: null,
      bounded_ui: 0.15,
      total: 9e-12,
      total_ui: null,
      preset: null,
    })
    expect(settings.guard).toBe(0.15)
    expect(settings.error_ratio).toBe(1e-6)
  })

  it('what is not written is its default, null, or an absent section', async () => {
    const { settings } = (await scenario(link())).options[0]!
    expect(settings.pads.cdm_current).toBe(4)
    expect(settings.supply.voltage).toBeNull()
    expect(settings.oscillator).toBeNull()
    expect(settings.demand.formulas.driver).toBeNull()
  })

  it('rows of a profile take their units by column', async () => {
    const text = link({
      oscillator:
        '{kind: LC, range: [13 GHz, 15 GHz], phase_noise: [[1 MHz, -110 dBc/Hz], [10 MHz, -131 dBc/Hz]]}',
    })
    expect((await scenario(text)).options[0]!.settings.oscillator?.phase_noise).toEqual([
      [1e6, -110],
      [10e6, -131],
    ])
  })
})

describe('uncertain values', () => {
  it('the settings carry the typical value, the provenance the percentiles', async () => {
    const given = await scenario(link({ power_budget: '{low: 200 mW, typical: 0.25 W, high: 310 mW}' }))
    expect(given.options[0]!.settings.power_budget).toBe(0.25)
    expect(at(given, 'power_budget').spread).toEqual({ low: 0.2, typical: 0.25, high: 0.31 })
  })

  it('published: the 95th percentile of a Gaussian stands 1.6448536 sigma from its mean', async () => {
    const given = await scenario(link({ power_budget: '{mean: 250 mW, sigma: 20 mW}' }))
    const { low, typical, high } = at(given, 'power_budget').spread!
    expect(typical).toBe(0.25)
    expect(high - typical).toBeCloseTo(0.02 * 1.6448536269514722, 14)
    expect(typical - low).toBeCloseTo(0.02 * 1.6448536269514722, 14)
  })

  it('law: the spread of a level is a ratio, in dB', async () => {
    const floor = (sigma: string) =>
      link({
        oscillator: '{kind: LC, range: [13 GHz, 15 GHz]}',
        loop: `{reference: 100 MHz, floor: {mean: -228 dBc/Hz, sigma: ${sigma}}}`,
      })
    const { low, typical, high } = at(await scenario(floor('2 dB')), 'loop.floor').spread!
    expect([low, typical, high]).toEqual([
      expect.closeTo(-228 - 2 * 1.6448536269514722, 12),
      -228,
      expect.closeTo(-228 + 2 * 1.6448536269514722, 12),
    ])
    expect(at(await scenario(floor('2 dBc/Hz')), 'loop.floor').spread).toEqual({ low, typical, high })
    expect(await faultsOf(floor('2 dBm'))).toMatchObject([{ code: 'unit.wrong-kind' }])
  })

  it('an option replaces an uncertain value whole', async () => {
    const text = link(
      { power_budget: '{low: 200 mW, typical: 250 mW, high: 310 mW}' },
      'options: [{id: a}, {id: b, power_budget: {mean: 0.1 W, sigma: 10 mW}}, {id: c, power_budget: 90 mW}]\n',
    )
    const given = await scenario(text)
    expect(given.options.map(({ settings }) => settings.power_budget)).toEqual([0.25, 0.1, 0.09])
    expect(at(given, 'power_budget', 2).spread).toBeUndefined()
  })
})

describe('options', () => {
  const text = link(
    { oscillator: '{kind: LC, range: [13 GHz, 15 GHz], tank_q: 12}', clock: '{fan_out: 2, gain: 1.5}' },
    `options:
  - {id: as-written}
  - {id: ring, label: A ring, oscillator: {kind: ring}, clock: {fan_out: 3}}
  - {id: without, oscillator: null}
`,
  )

  it('groups merge key by key, a section is switched off by null, and the order is kept', async () => {
    const { options } = await scenario(text)
    expect(options.map(({ id, label }) => [id, label])).toEqual([
      ['as-written', 'as-written'],
      ['ring', 'A ring'],
      ['without', 'without'],
    ])
    expect(options[1]!.settings.oscillator).toMatchObject({ kind: 'ring', range: [13e9, 15e9], tank_q: 12 })
    expect(options[1]!.settings.clock).toMatchObject({ fan_out: 3, gain: 1.5 })
    expect(options[0]!.settings.clock.fan_out).toBe(2)
    expect(options[2]!.settings.oscillator).toBeNull()
  })

  it('without options there is one, called base', async () => {
    expect((await scenario(link())).options.map(({ id }) => id)).toEqual(['base'])
  })

  it('examine and the cost index are read as given, by option and by node', async () => {
    const given = await scenario(
      link(
        { examine: '[sampler, driver]', cost_index: '{P28: 1.5, F16: 2e0}' },
        'options: [{id: a}, {id: b, examine: divider}]\n',
      ),
    )
    expect(given.options.map(({ settings }) => settings.examine)).toEqual([
      ['sampler', 'driver'],
      ['divider'],
    ])
    expect(given.head.cost_index).toEqual({ P28: 1.5, F16: 2 })
  })

  it('what every option gives need not stand above', async () => {
    const given = await scenario(
      link({ data_rate: null, options: '[{id: a, data_rate: 1 Gb/s}, {id: b, data_rate: 2 Gb/s}]' }),
    )
    expect(given.options.map(({ settings }) => settings.data_rate)).toEqual([1e9, 2e9])
  })

  it('a section begun above may be completed by each option', async () => {
    const given = await scenario(
      link({ oscillator: '{kind: LC}', options: '[{id: a, oscillator: {range: [13 GHz, 15 GHz]}}]' }),
    )
    expect(given.options[0]!.settings.oscillator?.range).toEqual([13e9, 15e9])
  })
})

describe('provenance', () => {
  it('tells the line of what is written and the source of what is not', async () => {
    const given = await scenario(link({ power_budget: '250 mW' }))
    expect(at(given, 'power_budget')).toMatchObject({
      value: 0.25,
      unit: 'W',
      shown: 'mW',
      symbol: 'P',
      origin: 'scenario',
      evidence: 'given',
      source: 'a.yaml, line 9',
    })
    expect(at(given, 'pads.cdm_current')).toMatchObject({ origin: 'default', evidence: 'common practice' })
    expect(at(given, 'transmitter.level_mismatch')).toMatchObject({
      origin: 'default',
      evidence: 'published',
    })
  })

  it('no default is without a source', async () => {
    const { provenance } = (await scenario(link())).options[0]!
    expect(provenance.length).toBeGreaterThan(70)
    expect(provenance.filter(({ source }) => source.trim() === '')).toEqual([])
    expect(new Set(provenance.map(({ path }) => path)).size).toBe(provenance.length)
  })
})

describe('include', () => {
  const files = {
    'shared/rates.yaml': 'data_rate: 28 Gb/s\nclock: {fan_out: 2, gain: 1.5}\nnodes: [own.yaml]\n',
    'shared/pads.yaml': 'pads: {cdm_current: 3 A}\nclock: {fan_out: 4}\n',
    'shared/own.yaml':
      'format: 1\nid: OWN\nlabel: Ours\nbased_on: P28\nnmos:\n  L: {value: 29 nm, source: us}\n',
  }

  it('later files win over earlier ones, and the own keys over both', async () => {
    const text = link({ include: '[shared/rates.yaml, shared/pads.yaml]', clock: '{style: CMOS}' })
    const { options, files: read } = await scenario(text, files)
    expect(options[0]!.settings).toMatchObject({
      data_rate: 56e9,
      clock: { style: 'CMOS', fan_out: 4, gain: 1.5 },
      pads: { cdm_current: 3 },
    })
    expect(read.map(({ file }) => file).sort()).toEqual(['a.yaml', 'shared/pads.yaml', 'shared/rates.yaml'])
  })

  it('a node file is looked for beside the file that names it', async () => {
    expect(await faultsOf(link({ nodes: null, include: '[shared/rates.yaml]' }), files)).toEqual([])
  })

  it('a file may be named by a number, like any other', async () => {
    const { options } = await scenario(link({ include: '[7]' }), { '7': 'guard: 20 %\n' })
    expect(options[0]!.settings.guard).toBe(0.2)
  })

  it('a fault in an included file names that file', async () => {
    const [fault] = await faultsOf(link({ pads: null, include: '[b.yaml]' }), {
      'b.yaml': 'pads:\n  cdm_current: 3 V\n',
    })
    expect(fault).toMatchObject({ file: 'b.yaml', line: 2, column: 16, code: 'unit.wrong-kind' })
  })
})

describe('forms of a file', () => {
  it('a byte-order mark, CRLF and JSON are read alike', async () => {
    const plain = await scenario(link())
    const json = JSON.stringify({
      format: 1,
      title: 'A lane',
      block: 'link',
      data_rate: '56 Gb/s',
      modulation: 'PAM-4',
      clocking: 'half-rate',
      error_ratio: 1e-6,
      nodes: ['P28'],
    })
    for (const text of [`\uFEFF${link()}`, link().replaceAll('\n', '\r\n'), json]) {
      const read = await scenario(text)
      expect(read.head).toEqual(plain.head)
      expect(read.options[0]!.settings).toEqual(plain.options[0]!.settings)
    }
  })

  it('keys that programs know leave nothing behind', async () => {
    const text = link({ cost_index: '{__proto__: 2, constructor: 3, P28: 1}' })
    const { head } = await scenario(text)
    expect(Object.entries(head.cost_index)).toEqual([
      ['__proto__', 2],
      ['constructor', 3],
      ['P28', 1],
    ])
    expect(({} as Record<string, unknown>).polluted).toBeUndefined()
  })

  it('a byte-order mark and CRLF shift no place', async () => {
    const text = link({ data_rate: '56', nodes: '[P28, P29]' })
    const places = async (one: string) =>
      (await faultsOf(one)).map(({ code, line, column }) => [code, line, column])
    const told = [
      ['unit.missing', 4, 12],
      ['node.unknown', 8, 14],
    ]
    expect(await places(text)).toEqual(told)
    expect(await places(`\uFEFF${text.replaceAll('\n', '\r\n')}`)).toEqual(told)
  })

  it('anchors and aliases stand for what they name', async () => {
    const given = await scenario(
      link({ power_budget: '&p 250 mW', options: '[{id: a}, {id: b, power_budget: *p}]' }),
    )
    expect(given.options[1]!.settings.power_budget).toBe(0.25)
  })
})

describe('texts that ship', () => {
  const demos = ['lane-56', 'lane-224', 'low-cost-lane', 'clock-generator']
  const texts = [...Object.entries(starters), ...demos.map((name) => [name, demo(name)] as const)]
  it.each(texts)('%s reads without fault, and so do its nodes', async (name, text) => {
    const read = await loadScenario(text, name, accessTo({}, ALL_CLASSES))
    expect(read.ok ? [] : read.faults).toEqual([])
  })
})
