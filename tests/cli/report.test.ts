import { describe, expect, it } from 'vitest'
import { checkReport } from '../../src/cli/check-report.ts'
import { gridLines } from '../../src/cli/grid.ts'
import { painter } from '../../src/cli/paint.ts'
import { aResult } from './a-result.ts'
import { openShell } from './shell.ts'

const NODES = ['P180', 'P130', 'P90', 'P65', 'P40', 'P28', 'T22', 'F16', 'F10', 'F7', 'F5', 'S3']
const OPTIONS = ['nrz-56', 'pam4-56', 'pam4-112']
const bare = (_: string, text: string): string => text
const ESCAPE = '\u001b'

describe('verdict grid', () => {
  it('shows five nodes side by side in 80 columns', () => {
    const lines = gridLines(aResult(OPTIONS, NODES.slice(0, 5)), 80, bare)
    expect(lines).toHaveLength(1 + OPTIONS.length)
    expect(Math.max(...lines.map((line) => line.length))).toBeLessThanOrEqual(80)
    for (const node of NODES.slice(0, 5)) expect(lines[0]).toContain(node)
  })

  it.each([40, 60, 80, 120])('never runs past %i columns and shows every node once', (width) => {
    const lines = gridLines(aResult(OPTIONS, NODES), width, bare)
    expect(Math.max(...lines.map((line) => line.length))).toBeLessThanOrEqual(width)
    const headings = lines
      .filter((line) => line.startsWith('option'))
      .flatMap((line) => line.split(/ +/).slice(1))
    expect(headings).toEqual(NODES)
  })

  it('says verdict and margin in every cell and never rounds across break-even or the guard', () => {
    const text = gridLines(aResult(['a'], ['N1', 'N2', 'N3', 'N4']), 80, bare)[1]!
    expect(text).toMatch(/^a\s+pass 1\.42\s+tight 1\.1499\s+fail 0\.9996\s+unknown –$/)
  })

  it('keeps its columns when coloured', () => {
    const paint = painter({ ...openShellIo({}, true) })
    const strip = (line: string): string =>
      line
        .split(ESCAPE)
        .map((part, k) => (k === 0 ? part : part.replace(/^\[\d+m/, '')))
        .join('')
    const result = aResult(OPTIONS, NODES)
    const coloured = gridLines(result, 80, paint)
    expect(coloured.join('\n')).toContain(`${ESCAPE}[`)
    expect(coloured.map(strip).map((line) => line.trimEnd())).toEqual(gridLines(result, 80, bare))
  })
})

function openShellIo(env: Readonly<Record<string, string>>, terminal: boolean) {
  const shell = openShell(env, terminal ? { columns: 80 } : undefined)
  shell.remove()
  return shell.io(
    () => {},
    () => {},
  )
}

describe('colour', () => {
  it.each([
    ['a terminal', {}, true, true],
    ['a pipe', {}, false, false],
    ['NO_COLOR', { NO_COLOR: '1' }, true, false],
    ['an empty NO_COLOR', { NO_COLOR: '' }, true, true],
    ['a dumb terminal', { TERM: 'dumb' }, true, false],
  ] as const)('on %s', (_, env, terminal, coloured) => {
    expect(painter(openShellIo(env, terminal))('pass', 'pass').includes(ESCAPE)).toBe(coloured)
  })
})

describe('report of check', () => {
  const text = checkReport(aResult(OPTIONS, NODES.slice(0, 5)), 80, bare)

  it('says the answer, what limits each case, what is unknown and what was not examined', () => {
    expect(text).toContain('It depends.')
    expect(text.replaceAll(/\s+/g, ' ')).toContain(
      'nrz-56 in P180: Clock buffers: device speed; transit frequency needs 100 GHz, has 142.1 GHz at slow, −40 °C, 855 mV; margin 1.42 pass',
    )
    expect(text).toMatch(/Asked, but unknown\n {2}Clock buffers: device speed: no floor is stated \[/)
    expect(text).toMatch(/Not examined\n {2}Link: the scenario states no channel \[every case\]/)
    expect(text).toContain('a pass needs 1.15')
  })

  it('stays inside the terminal', () => {
    expect(Math.max(...text.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80)
  })

  it('lets no control or direction character of a file reach the terminal', () => {
    const evil = '\u001b]0;owned\u0007\u202egnirts\u2066\u0085'
    const result = aResult([`o${evil}`], [`n${evil}`])
    const spoken = { ...result, answer: { ...result.answer, sentence: evil } }
    const shown = checkReport(
      { ...spoken, scenario: { ...result.scenario, title: evil, question: evil } },
      80,
      bare,
    )
    // biome-ignore lint/suspicious/noControlCharactersInRegex: these are what must not appear
    expect(shown.replaceAll('\n', '')).not.toMatch(/[\u0000-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]/)
  })
})
