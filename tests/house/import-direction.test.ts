import { dirname, join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { filesBelow, textAt } from './repository.ts'

/** The stages in the order in which data flows; a stage may use those above it, never those below. */
const STAGES = [
  'numeric',
  'derivation',
  'quantity',
  'scenario',
  'nodes',
  'device',
  'blocks',
  'clocking',
  'link',
  'verdict',
  'explore',
  'memo',
  'cli',
  'desk',
]
/** The only stages that touch files, processes and ports. */
const OUTER = new Set(['cli', 'desk'])
const MACHINE = /\bprocess\.|\bfetch\(|\brequire\(|\bimport\.meta\.url\b/

interface Import {
  readonly to: string
  readonly typeOnly: boolean
}

function importsOf(text: string): readonly Import[] {
  const statements = text.matchAll(/^\s*(?:import|export)\s+(type\s+)?(?:[^'";]*?\sfrom\s+)?'([^']+)'/gm)
  const lazy = text.matchAll(/\bimport\(\s*'([^']+)'\s*\)/g)
  return [
    ...[...statements].map(([, type, to]) => ({ to: to!, typeOnly: type !== undefined })),
    ...[...lazy].map(([, to]) => ({ to: to!, typeOnly: false })),
  ]
}

const stageOf = (path: string): string => path.split('/')[1] ?? ''
const withoutComments = (text: string): string => text.replace(/\/\*[\s\S]*?\*\/|^\s*\/\/.*$/gm, '')

function faultsOf(path: string, text: string): readonly string[] {
  const own = STAGES.indexOf(stageOf(path))
  if (own < 0) return [`${path}: the folder is not one of the stages`]
  const outer = OUTER.has(stageOf(path))
  const wrong = importsOf(text).flatMap(({ to }) => {
    if (!to.startsWith('.')) {
      return to.startsWith('node:') && !outer ? [`${path}: reaches the machine through ${to}`] : []
    }
    const target = STAGES.indexOf(stageOf(join(dirname(path), to)))
    return target > own ? [`${path}: imports ${to}, a later stage`] : []
  })
  const machine = !outer && MACHINE.test(withoutComments(text)) ? [`${path}: reaches the machine`] : []
  return [...wrong, ...machine]
}

const sources = filesBelow('src').filter((path) => path.endsWith('.ts'))

describe('one-way flow', () => {
  it('no file of src imports a later stage or reaches the machine outside the command line and the desk', () => {
    expect(sources.length).toBeGreaterThan(20)
    expect(sources.flatMap((path) => faultsOf(path, textAt(path)))).toEqual([])
  })

  it('would notice a backward import, a lazy one, a file system and an unknown folder', () => {
    expect(faultsOf('src/device/a.ts', "import { x } from '../blocks/b.ts'")).toHaveLength(1)
    expect(faultsOf('src/device/a.ts', "import type { X } from '../verdict/b.ts'")).toHaveLength(1)
    expect(
      faultsOf('src/scenario/keys/a.ts', "import {\n  x,\n  y,\n} from '../../nodes/b.ts'"),
    ).toHaveLength(1)
    expect(faultsOf('src/memo/a.ts', "const m = await import('../cli/b.ts')")).toHaveLength(1)
    expect(faultsOf('src/nodes/a.ts', "import { readFileSync } from 'node:fs'")).toHaveLength(1)
    expect(faultsOf('src/memo/a.ts', 'const home = process.env.HOME')).toHaveLength(1)
    expect(faultsOf('src/elsewhere/a.ts', '')).toHaveLength(1)
    expect(faultsOf('src/blocks/a.ts', "import { x } from '../device/b.ts'")).toEqual([])
    expect(faultsOf('src/cli/a.ts', "import { readFileSync } from 'node:fs'")).toEqual([])
  })

  it('only one file of the command line opens files', () => {
    const opening = sources.filter((path) => importsOf(textAt(path)).some(({ to }) => /^node:fs/.test(to)))
    expect(opening.filter((path) => stageOf(path) === 'cli')).toEqual(['src/cli/files.ts'])
  })

  it('no files import each other in a circle', () => {
    const edges = new Map(
      sources.map((path) => [
        path,
        importsOf(textAt(path))
          .filter(({ to, typeOnly }) => to.startsWith('.') && !typeOnly)
          .map(({ to }) => join(dirname(path), to)),
      ]),
    )
    const finished = new Set<string>()
    const circles: string[] = []
    const visit = (path: string, trail: readonly string[]): void => {
      if (trail.includes(path)) circles.push([...trail.slice(trail.indexOf(path)), path].join(' > '))
      else if (!finished.has(path)) {
        for (const next of edges.get(path) ?? []) visit(next, [...trail, path])
        finished.add(path)
      }
    }
    for (const path of sources) visit(path, [])
    expect(circles).toEqual([])
  })
})
