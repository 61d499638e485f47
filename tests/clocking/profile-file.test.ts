import { describe, expect, it } from 'vitest'
import { readScenario } from '../../src/scenario/read.ts'
import { accessTo } from '../scenario/scenarios.ts'

/** Profiles given as CSV files. *Law*: a file and the same table in the scenario are the same scenario. */

const scenario = (more: string): string =>
  `format: 1\ntitle: A clock\nblock: clock\nnodes: [P28]\nloop: {reference: 100 MHz}\noscillator: {kind: LC, range: [9 GHz, 10 GHz]${more}}\n`
const ROWS = [
  [1e3, -60],
  [1e5, -100.5],
  [1e9, -150],
]

async function rowsOf(text: string, files: Readonly<Record<string, string>> = {}) {
  const read = await readScenario(text, 'a.yaml', accessTo(files))
  if (!read.ok) throw new Error(JSON.stringify(read.faults))
  return { rows: read.value.options[0]!.settings.oscillator?.phase_noise, files: read.value.files }
}

describe('a profile file', () => {
  it.each([
    ['commas', 'offset [Hz],phase noise [dBc/Hz]\n1e3,-60\n1e5,-100.5\n1e9,-150\n'],
    [
      'semicolons, other order, other units, quotes',
      '"Phase noise (dBc/Hz)";"Offset (kHz)"\r\n-60;1\r\n-100.5;"100"\r\n-150;1e6\r\n',
    ],
    [
      'tabs, a byte-order mark, comments, a further column',
      '\ufeff# measured\noffset [MHz]\tphase_noise [dBc/Hz]\tremark\n0.001\t-60\ta\n0.1\t-100.5\tb\n1000\t-150\n\n',
    ],
  ])('reads %s', async (_, text) => {
    const { rows, files } = await rowsOf(scenario(', phase_noise_file: vco.csv'), { 'vco.csv': text })
    expect(rows?.map(([f, L]) => [f, L])).toEqual(ROWS.map(([f, L]) => [expect.closeTo(f!, 6), L]))
    expect(files.map(({ file }) => file)).toEqual(['a.yaml', 'vco.csv'])
  })

  it('equals the same table in the scenario', async () => {
    const table = ROWS.map(([f, L]) => `[${f} Hz, ${L} dBc/Hz]`).join(', ')
    const { rows } = await rowsOf(scenario(`, phase_noise: [${table}]`))
    expect(rows).toEqual(ROWS)
  })

  it('may stand in an option, whose path is relative to the file that names it', async () => {
    const text = `${scenario('')}options:\n  - {id: a}\n  - {id: b, oscillator: {phase_noise_file: data/vco.csv}}\n`
    const read = await readScenario(
      text,
      'a.yaml',
      accessTo({ 'data/vco.csv': 'offset [Hz],phase noise [dBc/Hz]\n1e3,-60\n1e9,-150\n' }),
    )
    if (!read.ok) throw new Error(JSON.stringify(read.faults))
    expect(
      read.value.options.map(({ settings }) => settings.oscillator?.phase_noise?.length ?? null),
    ).toEqual([null, 2])
  })
})
