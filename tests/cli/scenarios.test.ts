import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Result } from '../../src/verdict/result.ts'
import { openShell } from './shell.ts'

const shell = openShell()
afterAll(shell.remove)
const at = (name: string): string => join(shell.folder, name)

beforeAll(async () => {
  expect((await shell.run('start', 'link', 'link.yaml')).status).toBe(0)
  expect((await shell.run('start', 'clock', 'clock.yaml')).status).toBe(0)
})

describe('start', () => {
  it('never overwrites', async () => {
    const before = readFileSync(at('link.yaml'), 'utf8')
    const { status, err } = await shell.run('start', 'clock', 'link.yaml')
    expect(status).toBe(2)
    expect(err).toContain('argument.exists')
    expect(readFileSync(at('link.yaml'), 'utf8')).toBe(before)
  })

  it('is commented and says what is invented', () => {
    for (const name of ['link.yaml', 'clock.yaml']) {
      const text = readFileSync(at(name), 'utf8')
      expect(text.split('\n').filter((line) => line.includes('#')).length).toBeGreaterThan(5)
      expect(text).toMatch(/invented/i)
    }
  })
})

describe('check', () => {
  it.each(['link.yaml', 'clock.yaml'])('judges the starter %s as it is', async (name) => {
    const { status, out, err } = await shell.run('check', name)
    expect(err).toBe('')
    expect(status).toBe(0)
    expect(out).toMatch(/^option {2,}\S/m)
    expect(out).toMatch(/\b(pass|tight|fail|unknown)\b/)
    expect(out).toContain('What limits each case')
    expect(Math.max(...out.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80)
  })

  it('--json is the result contract and nothing else', async () => {
    const { status, out, err } = await shell.run('check', 'link.yaml', '--json')
    expect(status).toBe(0)
    expect(err).toBe('')
    const result = JSON.parse(out) as Result
    expect(Object.keys(result)).toEqual(
      expect.arrayContaining([
        'format',
        'tool',
        'scenario',
        'inputs',
        'options',
        'nodes',
        'assumptions',
        'cases',
        'answer',
      ]),
    )
    expect(result.cases).toHaveLength(result.options.length * result.nodes.length)
    expect(out).not.toMatch(/NaN|Infinity/)
    for (const { file, sha256 } of result.inputs) {
      expect(file).not.toBe('')
      expect(sha256).toMatch(/^[0-9a-f]{64}$/)
    }
    expect(result.inputs.map(({ file }) => file)).toContain('link.yaml')
  })

  it('the hash of an input is that of its bytes (independent: sha256sum)', async () => {
    const { createHash } = await import('node:crypto')
    const { out } = await shell.run('check', 'link.yaml', '--json')
    const own = (JSON.parse(out) as Result).inputs.find(({ file }) => file === 'link.yaml')
    expect(own?.sha256).toBe(
      createHash('sha256')
        .update(readFileSync(at('link.yaml')))
        .digest('hex'),
    )
  })

  it('--must-pass leaves with 3 unless an option passes there, and with 2 for a stranger', async () => {
    const { out } = await shell.run('check', 'link.yaml', '--json')
    const { cases, nodes } = JSON.parse(out) as Result
    for (const { id } of nodes) {
      const passes = cases.some(({ node, verdict }) => node === id && verdict === 'pass')
      expect((await shell.run('check', 'link.yaml', '--must-pass', id)).status).toBe(passes ? 0 : 3)
    }
    const { status, err } = await shell.run('check', 'link.yaml', '--must-pass', 'P29')
    expect(status).toBe(2)
    expect(err).toContain('argument.node')
  })
})

describe('a scenario with five faults', () => {
  const broken = `format: 1
title: Broken on purpose
block: link
data_rate: 112 GB/s
modulaton: PAM-4
clocking: third-rate
error_ratio: -1e-6
nodes: [P28, P29]
`
  it.each(['check', 'memo'])(
    '%s lists all five with place, finding, allowance and remedy, and leaves with 2',
    async (name) => {
      writeFileSync(at('broken.yaml'), broken)
      const { status, out, err } = await shell.run(name, 'broken.yaml')
      expect(status).toBe(2)
      expect(out).toBe('')
      const heads = [...err.matchAll(/^broken\.yaml:(\d+):(\d+) {2}(\S+)$/gm)].map(
        ([, line, column, code]) => [Number(line), Number(column), code],
      )
      expect(heads).toEqual(
        expect.arrayContaining([
          [4, 12, 'unit.wrong-kind'],
          [5, 1, 'key.unknown'],
          [6, 11, 'choice.unknown'],
          [7, 14, 'number.out-of-range'],
          [8, 14, 'node.unknown'],
        ]),
      )
      expect(err.match(/^ {4}found {4}\S/gm)).toHaveLength(heads.length)
      expect(err.match(/^ {4}allowed {2}\S/gm)).toHaveLength(heads.length)
      expect(err.match(/^ {4}remedy {3}\S/gm)).toHaveLength(heads.length)
      expect(err).toContain('modulation')
      expect(err).not.toMatch(/\n\s+at /)
      expect(existsSync(at('broken.html'))).toBe(false)
    },
  )
})

describe('why', () => {
  it('derives a check step by step, and names the nearest of what does not exist', async () => {
    const { out: json } = await shell.run('check', 'clock.yaml', '--json')
    const { cases } = JSON.parse(json) as Result
    const one = cases.find(({ limitedBy }) => limitedBy !== null)!
    const { status, out } = await shell.run('why', 'clock.yaml', one.option, one.node, one.limitedBy!)
    expect(status).toBe(0)
    expect(out).toContain(one.limitedBy!)
    expect(out).toMatch(/^ {2}s1 /m)
    expect(out).toMatch(/\(margin\)/)
    expect((await shell.run('why', 'clock.yaml', one.option, one.node)).status).toBe(0)
    for (const asked of [
      ['nothing', one.node],
      [one.option, 'P29'],
      [one.option, one.node, 'nothing.here'],
    ]) {
      const wrong = await shell.run('why', 'clock.yaml', ...asked)
      expect(wrong.status).toBe(2)
      expect(wrong.err).toContain('nearest')
    }
  })
})

describe('memo', () => {
  it('writes every format beside each other, the same bytes each time', async () => {
    for (const folder of ['one', 'two']) {
      const { status, out } = await shell.run('memo', 'link.yaml', '--out', folder, '--date', '2027-03-01')
      expect(status).toBe(0)
      for (const ending of ['html', 'pdf', 'json', 'csv'])
        expect(out).toContain(join(folder, `link.${ending}`))
    }
    for (const ending of ['html', 'pdf', 'json', 'csv']) {
      const [one, two] = ['one', 'two'].map((folder) => readFileSync(at(`${folder}/link.${ending}`)))
      expect(one!.length).toBeGreaterThan(500)
      expect(one!.equals(two!)).toBe(true)
    }
    expect(readFileSync(at('one/link.html'), 'utf8')).toContain('2027-03-01')
  })

  it('writes only what was asked for', async () => {
    const { status } = await shell.run('memo', 'clock.yaml', '--out', 'few', '--as', 'json')
    expect(status).toBe(0)
    expect(existsSync(at('few/clock.json'))).toBe(true)
    expect(existsSync(at('few/clock.html'))).toBe(false)
  })
})

describe('nodes, schema, guide', () => {
  it('lists the classes from the largest, and shows one with the source of every value', async () => {
    const { status, out } = await shell.run('nodes')
    expect(status).toBe(0)
    const classes = [...out.matchAll(/ (\d+(?:\.\d+)?) nm /g)].map(([, nm]) => Number(nm))
    expect(classes.length).toBeGreaterThanOrEqual(12)
    expect(classes).toEqual([...classes].sort((a, b) => b - a))
    const one = await shell.run('nodes', 'P28')
    expect(one.status).toBe(0)
    expect(one.out).toMatch(/nmos\.mu0 = .*cm²\/\(V·s\)/)
    const wrong = await shell.run('nodes', 'P29')
    expect(wrong.status).toBe(2)
    expect(wrong.err).toContain('nearest')
  })

  it.each(['scenario', 'node'])('prints a JSON Schema of %s files', async (which) => {
    const { status, out } = await shell.run('schema', which)
    expect(status).toBe(0)
    expect(JSON.parse(out)).toMatchObject({ $schema: expect.stringContaining('json-schema.org') })
  })

  it('writes the guide as one page with every key, code, class and sub-block, and nothing from outside', async () => {
    const { status, out, err } = await shell.run('guide', '--out', 'guide.html')
    expect(err).toBe('')
    expect(status).toBe(0)
    expect(out.trim()).toBe('guide.html')
    const html = readFileSync(at('guide.html'), 'utf8')
    for (const word of [
      'oscillator.tank_q',
      'unit.wrong-kind',
      'argument.exists',
      'P28',
      'clock_buffers',
      'nmos.mu0',
    ]) {
      expect(html).toContain(word)
    }
    expect(html).not.toMatch(/<script|<link|\bsrc=|@import|url\(|https?:\/\//)
  })
})
