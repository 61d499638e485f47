import { readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { filesBelow, ROOT, textAt } from './repository.ts'

const TOP = [
  'CHANGELOG.md',
  'DEVELOPERS.md',
  'LICENSE',
  'README.md',
  'package-lock.json',
  'package.json',
  'scenarios-demo',
  'src',
  'templates',
  'tests',
]
const MADE = ['coverage', 'dist', 'node_modules', 'out']

describe('top level', () => {
  it('holds what it is meant to hold and nothing else', () => {
    const found = readdirSync(ROOT).filter((name) => !name.startsWith('.') && !MADE.includes(name))
    expect(found.sort()).toEqual([...TOP].sort())
  })
})

describe('file sizes', () => {
  /** Declarations of keys read better in one place. */
  const DECLARATIONS = /^src\/(scenario\/keys\/|nodes\/keys\.ts$)/
  const sizes = filesBelow('src')
    .filter((path) => path.endsWith('.ts'))
    .map((path) => ({ path, lines: textAt(path).split('\n').length - 1 }))

  it('no file of src is longer than 300 lines, declarations of keys aside', () => {
    expect(sizes.filter(({ path, lines }) => lines > 300 && !DECLARATIONS.test(path))).toEqual([])
  })

  it('the median file is at most 150 lines', () => {
    const sorted = sizes.map(({ lines }) => lines).sort((a, b) => a - b)
    expect(sorted[Math.floor(sorted.length / 2)]).toBeLessThanOrEqual(150)
  })

  it('files are named after the engineering', () => {
    const vague = /(^|[-/])(utils?|helpers?|managers?|misc|common|stuff)([-./]|$)/
    expect(filesBelow('src').filter((path) => vague.test(path))).toEqual([])
  })
})

describe('tests', () => {
  const tests = filesBelow('tests').filter((path) => path.endsWith('.ts'))

  it('none is switched off and none runs alone', () => {
    const switched = /\b(?:it|test|describe)\s*\.\s*(?:only|skip|tod[o]|fails)\b|\bx(?:it|describe|test)\(/
    expect(tests.filter((path) => switched.test(textAt(path)))).toEqual([])
  })

  it('every test file has a name that the runner finds', () => {
    const missed = tests.filter(
      (path) => /^(?:describe|it|test)\(/m.test(textAt(path)) && !path.endsWith('.test.ts'),
    )
    expect(missed).toEqual([])
  })
})
