import { describe, expect, it } from 'vitest'
import { FAULT_CODES, type FaultCode } from '../../src/scenario/fault-codes.ts'
import { accessTo, faultsOf, link, marked } from './scenarios.ts'

type Files = Readonly<Record<string, string>>
/** The mark § stands where the fault must be told; it may stand in another file. */
type Provoked = readonly [code: FaultCode, what: string, text: string, files?: Files]

const levels = (deep: number): string =>
  Array.from({ length: deep }, (_, k) => `${' '.repeat(k)}${k === 33 ? '§' : ''}a:`).join('\n')
const bomb = (): string => {
  const names = [...'abcdefg']
  const nine = (one: string): string => `[${Array(9).fill(one).join(', ')}]`
  const lines = names.map((name, k) => `${name}: &${name} ${k === 0 ? nine('x') : nine(`*${names[k - 1]}`)}`)
  return lines.join('\n')
}
const node = (record: string): Files => ({
  'own.yaml': `format: 1\nid: OWN\nlabel: Own\nbased_on: P28\nnmos:\n  L: ${record}\n`,
})
const own = link({ nodes: '[own.yaml]' })
const many = (count: number, one: (k: number) => string): string =>
  Array.from({ length: count }, (_, k) => one(k)).join(', ')

const CLOCK = 'format: 1\ntitle: A clock\nblock: clock\nnodes: [P28]\n'
const clock = (more: string): string => `${CLOCK}oscillator: {kind: LC, range: [9 GHz, 10 GHz]}\n${more}\n`
const measured = (rows: string, more = ''): string =>
  `${CLOCK}oscillator: {kind: LC, range: [9 GHz, 10 GHz], phase_noise: [${rows}]${more}}\n`
const measuredFile = (name: string): string =>
  `${CLOCK}oscillator: {kind: LC, range: [9 GHz, 10 GHz], phase_noise_file: ${name}}\n`
const CSV = 'offset [Hz],phase noise [dBc/Hz]\n1e3,-80\n1e6,-110\n1e9,-150\n'

const PROVOKED: readonly Provoked[] = [
  ['file.missing', 'an include', link({ include: '[§b.yaml]' })],
  ['file.missing', 'a node file', link({ nodes: '[P28, §none.yaml]' })],
  [
    'file.missing',
    'an include of an include',
    link({ include: '[b.yaml]' }),
    { 'b.yaml': 'include: [§c.yaml]' },
  ],
  ['file.too-large', 'beyond 256 Ki characters', `§# ${'x'.repeat(2 ** 18)}`],
  ['file.empty', 'nothing', '§'],
  ['file.empty', 'only a comment', '§# nothing yet\n'],
  ['file.binary', 'a null byte', 'format: 1\ntitle: a§\u0000b'],
  ['file.binary', 'an escape', 'format: 1\ntitle: §\u001b[2J'],
  ['yaml.syntax', 'a tab', 'format: 1\n§\ttitle: x\n'],
  ['yaml.syntax', 'an open bracket', 'format: 1\nnodes: [P28\n§'],
  ['yaml.duplicate-key', 'at the top', link({}, '§title: Again\n')],
  ['yaml.duplicate-key', 'inside a group', link({}, 'clock: {fan_out: 1, §fan_out: 2}\n')],
  ['yaml.too-deep', 'indentation', levels(40)],
  ['yaml.too-deep', 'open brackets', `${'['.repeat(33)}§${'['.repeat(100_000)}`],
  ['yaml.too-deep', 'closed brackets', `${'['.repeat(33)}§${'['.repeat(1e5)}${']'.repeat(1e5 + 33)}`],
  ['yaml.too-deep', 'braces', `${'{a: '.repeat(33)}§${'{a: '.repeat(100)}${'}'.repeat(133)}`],
  // Deep lists on one line once ended the process, beyond what can be caught.
  ['yaml.too-deep', 'lists on one line', `${'- '.repeat(33)}§${'- '.repeat(3000)}`],
  ['yaml.too-deep', 'keys on one line', `${'? '.repeat(33)}§${'? '.repeat(100_000)}`],
  // The list is the first value and x number k the (k + 1)st, so the 50 000th x passes the limit.
  ['yaml.aliases', 'more values than the limit', `[${'x,'.repeat(49_999)}§x,x]`],
  ['yaml.alias-unknown', 'no anchor', link({ title: '§*nowhere' })],
  ['yaml.documents', 'two', link({}, '§---\nformat: 1\n')],
  ['yaml.tag', 'of a program', link({ title: '!!js/function §"a"' })],
  ['shape.mapping', 'a word for a group', link({ oscillator: '§LC' })],
  ['shape.mapping', 'a list for the file', '§- format: 1\n'],
  ['shape.mapping', 'a word for an option', link({ options: '[§fast]' })],
  ['shape.list', 'a mapping for a list', link({ examine: '§{driver: yes}' })],
  ['shape.list', 'no options', link({ options: '§[]' })],
  ['shape.text', 'a list for a text', link({ title: '§[a, b]' })],
  ['shape.text', 'an empty title', link({ title: '§""' })],
  ['shape.text', 'a list entry without text', link({ nodes: '[P28, §~]' })],
  ['key.unknown', 'at the top', link({}, '§modulaton: PAM-2\n')],
  ['key.unknown', 'in a group', link({ receiver: '{§dfe_tap: 1}' })],
  ['key.unknown', 'in an option', link({ options: '[{id: a, §date_rate: 1}]' })],
  ['key.unknown', 'a scenario key in an option', link({ options: '[{id: a, §nodes: [F16]}]' })],
  ['key.unknown', 'of a machine', link({}, '§__proto__: {polluted: 1}\n')],
  ['key.unknown', 'in a record of a node', own, node('{value: 30 nm, source: us, §unit: nm}')],
  ['key.missing', 'of the head', link({ format: null, title: '§A lane' }).replace('title: §', '§title: ')],
  ['key.missing', 'of a node', own, { 'own.yaml': '§format: 1\nid: OWN\nbased_on: P28\n' }],
  ['key.missing', 'of a link', link({ block: '§link', clocking: null })],
  ['key.missing', 'blanked by an option', link({ options: '[{id: a, data_rate: §null}]' })],
  ['key.missing', 'of a section', link({ loop: '§{bandwidth: 1 MHz}' })],
  ['key.missing', 'the id of an option', link({ options: '[§{label: A}]' })],
  ['unit.missing', 'a bare number', link({ data_rate: '§56' })],
  ['unit.missing', 'in a range', link({ process: '{temperature: [§-40, 125 °C]}' })],
  ['unit.unknown', 'another case', link({ clock: '{frequency: §14 GHZ}' })],
  ['unit.unknown', 'a decimal comma', link({ data_rate: '§56,5 Gb/s' })],
  ['unit.wrong-kind', 'bytes', link({ data_rate: '§112 GB/s' })],
  ['unit.wrong-kind', 'cycles for bits', link({ data_rate: '§112 GHz' })],
  ['unit.wrong-kind', 'decibels for volts', link({ transmitter: '{swing: §1 dB}' })],
  ['number.unreadable', 'a word', link({ data_rate: '§fast' })],
  [
    'number.unreadable',
    'nothing under a key of a spread',
    link({ power_budget: '{low: §null, typical: 2 W, high: 3 W}' }),
  ],
  ['number.not-finite', 'infinity', link({ guard: '§.inf' })],
  ['number.not-finite', 'not a number', link({ guard: '§.nan' })],
  ['number.not-finite', 'a word for it with a unit', link({ clock: '{frequency: §NaN GHz}' })],
  ['number.not-finite', 'in a node', own, node('{value: §.inf, source: us}')],
  ['number.not-finite', 'beyond what a number can hold', link({ guard: '§1e999' })],
  ['number.out-of-range', 'negative', link({ error_ratio: '§-1e-6' })],
  ['number.out-of-range', 'zero', link({ power_budget: '§0 W' })],
  ['number.out-of-range', 'another format', link({ format: '§2' })],
  ['number.out-of-range', 'absurd', link({ data_rate: '§56e15 b/s' })],
  ['number.out-of-range', 'a spread beyond the limits', link({ power_budget: '§{mean: 1 W, sigma: 1 W}' })],
  ['number.not-whole', 'a fraction', link({ receiver: '{dfe_taps: §1.5}' })],
  ['choice.unknown', 'a modulation', link({ modulation: '§PAM4' })],
  ['choice.unknown', 'the block', link({ block: '§lane' })],
  [
    'choice.unknown',
    'the evidence of a node value',
    own,
    node('{value: 30 nm, source: us, evidence: §hearsay}'),
  ],
  ['text.too-long', 'a title', link({ title: `§${'x'.repeat(201)}` })],
  ['text.form', 'a date', link({ date: '§1.3.2027' })],
  ['text.form', 'the id of an option', link({ options: '[{id: §a b}]' })],
  ['date.impossible', '31 February', link({ date: '§2027-02-31' })],
  ['uncertain.form', 'one end only', link({ power_budget: '§{low: 1 W, typical: 2 W}' })],
  ['uncertain.form', 'a list', link({ power_budget: '§[1 W, 2 W]' })],
  ['uncertain.order', 'low above typical', link({ power_budget: '§{low: 3 W, typical: 2 W, high: 4 W}' })],
  ['uncertain.order', 'of a node value', own, node('§{value: 30 nm, low: 31 nm, source: us}')],
  ['uncertain.not-allowed', 'the error target', link({ error_ratio: '§{mean: 1e-6, sigma: 1e-7}' })],
  ['range.form', 'the higher first', link({ oscillator: '{kind: LC, range: §[15 GHz, 13 GHz]}' })],
  ['range.form', 'one value', link({ oscillator: '{kind: LC, range: §14 GHz}' })],
  [
    'rows.form',
    'a row too short',
    link({ oscillator: '{kind: LC, range: [13 GHz, 15 GHz], phase_noise: [§[1 MHz]]}' }),
  ],
  ['list.too-long', 'nodes', link({ nodes: `§[${many(41, (k) => `n${k}.yaml`)}]` })],
  ['list.too-long', 'options', link({ options: `§[${many(65, (k) => `{id: o${k}}`)}]` })],
  ['option.duplicate', 'the same id', link({ options: '[{id: a}, {id: §a}]' })],
  ['node.unknown', 'another id', link({ nodes: '[P28, §P29]' })],
  ['node.unknown', 'what a node is based on', own, { 'own.yaml': 'format: 1\nid: OWN\nbased_on: §P29\n' }],
  ['node.duplicate', 'the same id', link({ nodes: '[P28, §P28]' })],
  ['include.cycle', 'of scenarios', link({ include: '[b.yaml]' }), { 'b.yaml': 'include: [§a.yaml]' }],
  [
    'include.cycle',
    'of nodes',
    own,
    { 'own.yaml': 'format: 1\nbased_on: b.yaml', 'b.yaml': 'based_on: §own.yaml' },
  ],
  // Included from the last to the first: a.yaml and 40 times b.yaml pass the limit at the 41st from the end.
  [
    'include.too-many',
    'one file many times',
    link({ include: `[b.yaml, §b.yaml, ${many(40, () => 'b.yaml')}]` }),
    { 'b.yaml': 'notes: x' },
  ],
  ['source.missing', 'a bare value in a node', own, node('§30 nm')],
  ['source.missing', 'a record without source', own, node('§{value: 30 nm}')],
  ['source.missing', 'a record with an empty source', own, node('§{value: 30 nm, source: ""}')],
  ['rule.form', 'a call of something else', link({ demand: '{formulas: {driver: §"evaluate(1)"}}' })],
  ['rule.form', 'an assignment', link({ demand: '{formulas: {driver: §"k = 3"}}' })],
  ['oscillator.missing', 'in a clock block', 'format: 1\ntitle: A clock\nblock: §clock\nnodes: [P28]\n'],
  ['channel.incomplete', 'a loss without frequency', link({ channel: '§{loss: 20 dB}' })],
  ['noise.twice', 'a density and a figure', link({ noise: '§{density: 1e-17 V^2/Hz, figure: 10 dB}' })],
  ['jitter.incomplete', 'no allowance', link({ jitter_budget: '§{}' })],
  ['jitter.preset-block', "a lane's in a clock block", clock('jitter_budget: §{preset: ieee-802.3ck-kr}')],
  [
    'jitter.preset-block',
    "a reference clock's in a lane",
    link({ jitter_budget: '§{preset: pcie-refclk-16g}' }),
  ],
  ['key.other-block', "a lane's key in a clock block", clock('modulation: §PAM-4')],
  ['key.other-block', 'even-odd jitter of one phase', clock('jitter_budget: §{even_odd: 1 ps}')],
  ['jitter.unit-interval', 'random jitter in UI', clock('jitter_budget: §{random: 0.01 UI}')],
  ['loop.oscillator', 'in a lane', link({ loop: '§{reference: 100 MHz}' })],
  ['loop.band', 'too narrow', clock('loop: §{reference: 100 MHz, band: [1 MHz, 1.5 MHz]}')],
  [
    'profile.order',
    'unsorted',
    measured('[1 kHz, -80 dBc/Hz], [1 MHz, -110 dBc/Hz], §[100 kHz, -100 dBc/Hz]'),
  ],
  ['profile.order', 'an offset twice', measured('[1 kHz, -80 dBc/Hz], §[1 kHz, -81 dBc/Hz]')],
  [
    'number.out-of-range',
    'a profile above the carrier',
    measured('[1 kHz, §3 dBc/Hz], [1 GHz, -150 dBc/Hz]'),
  ],
  [
    'profile.short',
    'a band outside the table',
    `${CLOCK}loop: {reference: 100 MHz}\noscillator: §{kind: LC, range: [9 GHz, 10 GHz], phase_noise: [[10 kHz, -80 dBc/Hz], [1 MHz, -110 dBc/Hz]]}\n`,
  ],
  [
    'profile.short',
    'a reference from too far out',
    clock('loop: §{reference: 100 MHz, reference_noise: [[10 kHz, -140 dBc/Hz], [100 MHz, -160 dBc/Hz]]}'),
  ],
  [
    'profile.twice',
    'a table and a file',
    measured('[1 kHz, -80 dBc/Hz], [1 GHz, -150 dBc/Hz]', ', phase_noise_file: §vco.csv'),
    { 'vco.csv': CSV },
  ],
  ['file.missing', 'a profile', measuredFile('§none.csv')],
  ['csv.form', 'no header', measuredFile('vco.csv'), { 'vco.csv': '§1e3,-80\n1e6,-110\n' }],
  ['csv.form', 'no unit', measuredFile('vco.csv'), { 'vco.csv': '§offset,phase noise\n1e3,-80\n1e6,-110\n' }],
  ['csv.form', 'no rows', measuredFile('vco.csv'), { 'vco.csv': '§offset [Hz],phase noise [dBc/Hz]\n' }],
  [
    'csv.form',
    'an open quote',
    measuredFile('vco.csv'),
    { 'vco.csv': 'offset [Hz],phase noise [dBc/Hz]\n§"1e3,-80\n' },
  ],
  [
    'unit.unknown',
    'a unit of a file',
    measuredFile('vco.csv'),
    { 'vco.csv': CSV.replace('[Hz]', '[Hertz]').replace('\n1e3', '\n§1e3') },
  ],
  [
    'number.unreadable',
    'a word in a file',
    measuredFile('vco.csv'),
    { 'vco.csv': CSV.replace('-110', '§low') },
  ],
  ['profile.order', 'unsorted in a file', measuredFile('vco.csv'), { 'vco.csv': CSV.replace('1e6', '§1e2') }],
]

/** The files without the mark, and where it stood. */
function unmarked(text: string, others: Files) {
  const files = Object.entries({ 'a.yaml': text, ...others })
  const [file, holding] = files.find(([, one]) => one.includes('§'))!
  const { line, column } = marked(holding)
  const texts = Object.fromEntries(files.map(([name, one]) => [name, one.replace('§', '')]))
  return { place: [file, line, column], texts }
}

describe('each fault is told with its code, line and column', () => {
  const cases = PROVOKED.map(([code, what, text, others = {}]) => ({ code, what, text, others }))
  it.each(cases)('$code: $what', async ({ code, text, others }) => {
    const { place, texts } = unmarked(text, others)
    const found = await faultsOf(texts['a.yaml']!, texts)
    expect(found.map((fault) => [fault.code, fault.file, fault.line, fault.column])).toContainEqual([
      code,
      ...place,
    ])
  })

  it('aliases that multiply are refused, and nothing else is told', async () => {
    expect(await faultsOf(bomb())).toMatchObject([{ code: 'yaml.aliases', line: 1 }])
  })

  it('files that include each other many times are refused once', async () => {
    const b = `include: [${many(8, () => 'c.yaml')}]`
    const c = `include: [${many(8, () => 'd.yaml')}]`
    const found = await faultsOf(link({ include: `[${many(8, () => 'b.yaml')}]` }), {
      'b.yaml': b,
      'c.yaml': c,
      'd.yaml': 'notes: x',
    })
    expect(found.filter(({ code }) => code === 'include.too-many')).toMatchObject([
      { file: 'c.yaml', line: 1 },
    ])
  })

  it('every registered code is provoked here', () => {
    const provoked = new Set(PROVOKED.map(([code]) => code))
    expect(Object.keys(FAULT_CODES).filter((code) => !provoked.has(code as FaultCode))).toEqual([])
  })

  it('every fault says what was found, what is allowed and how to mend it', async () => {
    for (const [, , text, others = {}] of PROVOKED) {
      const { texts } = unmarked(text, others)
      for (const { code, found, allowed, remedy } of await faultsOf(texts['a.yaml']!, texts)) {
        expect(Object.keys(FAULT_CODES)).toContain(code)
        for (const said of [found, allowed, remedy]) expect(said.trim(), code).not.toBe('')
        expect(found.length).toBeLessThanOrEqual(80)
      }
    }
  })
})

describe('remedies', () => {
  const remedy = async (text: string) => (await faultsOf(text)).map((fault) => fault.remedy).join('; ')
  it.each([
    [link({ data_rate: '112 GB/s' }), 'bytes'],
    [link({ data_rate: '112 Gbps' }), '`Gb/s`'],
    [link({ data_rate: '112 GHz' }), 'a data rate is in b/s'],
    [link({ clock: '{frequency: 14 GHZ}' }), '`GHz`'],
    [link({ data_rate: '56' }), '56 Gb/s'],
    [link({}, 'modulaton: PAM-2\n'), '`modulation`'],
    [link({ modulation: 'PAM4' }), '`PAM-4`'],
    [link({ clocking: 'half' }), '`half-rate`'],
    [link({ format: '2' }), '`format: 1`'],
    [link({ channel: '{loss: -22 dB, at: 14 GHz}' }), 'minus sign'],
    [link({ power_budget: '1 V' }), 'in mW or a multiple of it'],
    [link({ nodes: '[P29]' }), '`P28`'],
    [link({ process: '{temperature: [-40 C, 125 C]}' }), 'coulomb'],
    [link({ options: '[{id: a, nodes: [F16]}]' }), 'move it to the top'],
  ])('%#: names what was meant', async (text, said) => {
    expect(await remedy(text)).toContain(said)
  })
})

describe('one run', () => {
  it('tells faults of ten kinds at their places, in the order of the text', async () => {
    const text = `format: 1
title: A lane
block: link
data_rate: 112 GB/s
modulation: PAM4
clocking: half-rate
error_ratio: 0
gaurd: 10 %
oscillator: {kind: LC, range: [15 GHz, 13 GHz], tank_q: {low: 9, high: 12}}
loop: {reference: 156.25, floor: .nan}
nodes: [P28, P29]
options:
  - {id: a}
  - {id: a}
`
    const told = (await faultsOf(text)).map(({ code, line, column }) => [code, line, column])
    expect(told).toEqual([
      ['unit.wrong-kind', 4, 12],
      ['choice.unknown', 5, 13],
      ['number.out-of-range', 7, 14],
      ['key.unknown', 8, 1],
      ['range.form', 9, 31],
      ['uncertain.form', 9, 57],
      ['unit.missing', 10, 19],
      ['number.not-finite', 10, 34],
      ['node.unknown', 11, 14],
      ['option.duplicate', 14, 10],
    ])
  })

  it('tells the faults of a node whose base is missing, and nothing that the base might have held', async () => {
    const files = { 'own.yaml': 'format: 1\nid: OWN\nbased_on: P29\nnmos:\n  L: 30 nm\n' }
    const told = (await faultsOf(link({ nodes: '[own.yaml]' }), files)).map(({ code, line }) => [code, line])
    expect(told).toEqual([
      ['node.unknown', 3],
      ['source.missing', 5],
    ])
  })

  it('tells nothing missing that a file which cannot be read might have held', async () => {
    const text = link({ include: '[none.yaml]', data_rate: null, title: null, guard: '-1' })
    expect((await faultsOf(text)).map(({ code }) => code).sort()).toEqual([
      'file.missing',
      'number.out-of-range',
    ])
  })

  it('tells a fault once that two nodes share', async () => {
    const files = {
      'b.yaml': 'format: 1\nid: B\nlabel: B\nbased_on: d.yaml\n',
      'c.yaml': 'format: 1\nid: C\nlabel: C\nbased_on: d.yaml\n',
      'd.yaml': 'based_on: P28\nfo4: 13 ps\n',
    }
    const told = await faultsOf(link({ nodes: '[b.yaml, c.yaml]' }), files)
    expect(told).toMatchObject([{ code: 'source.missing', file: 'd.yaml', line: 2, column: 6 }])
  })
})

it('faults of options, nodes and head are told together', async () => {
  const text = link(
    {
      data_rate: '112 GB/s',
      clocking: 'third-rate',
      error_ratio: '0',
      nodes: '[P28, P29, none.yaml]',
      modulation: null,
    },
    'titel: x\noscillator: {kind: LC, range: [15, 13 GHz], bank_Q: 3}\noptions: [{id: a, guard: -1}, {id: a, power_budget: 1 V}]\n',
  )
  const found = await faultsOf(text)
  expect(found.map(({ code }) => code).sort()).toEqual(
    [
      'unit.wrong-kind',
      'choice.unknown',
      'number.out-of-range',
      'node.unknown',
      'file.missing',
      'key.missing',
      'key.unknown',
      'key.unknown',
      'unit.missing',
      'number.out-of-range',
      'option.duplicate',
      'unit.wrong-kind',
    ].sort(),
  )
})

it('a file outside the declared ones is never asked for', async () => {
  const asked: string[] = []
  const access = accessTo()
  const { loadScenario } = await import('../../src/nodes/load.ts')
  await loadScenario(link({ nodes: '[P28, b.yaml]' }), 'a.yaml', {
    ...access,
    read: (path, from) => {
      asked.push(path)
      return access.read(path, from)
    },
  })
  expect(asked).toEqual(['b.yaml'])
})
