import { readdirSync, readFileSync } from 'node:fs'
import { join, posix } from 'node:path'
import { loadScenario } from '../../src/nodes/load.ts'
import type { Fault } from '../../src/scenario/fault.ts'
import type { Access } from '../../src/scenario/tree.ts'

const CLASSES = new URL('../../src/nodes/classes/', import.meta.url)

/** Ids of every built-in class. */
export const ALL_CLASSES: readonly string[] = readdirSync(CLASSES)
  .filter((name) => name.endsWith('.yaml'))
  .map((name) => name.slice(0, -'.yaml'.length))

/** Access to files given as texts by name, and to some of the built-in classes. */
export function accessTo(
  files: Readonly<Record<string, string>> = {},
  ids: readonly string[] = ['F16', 'P28'],
): Access {
  return {
    read: (path, from) => {
      const file = posix.join(posix.dirname(from), path)
      const text = files[file]
      return text === undefined ? null : { file, text }
    },
    builtIn: (id) => (ids.includes(id) ? readFileSync(new URL(`${id}.yaml`, CLASSES), 'utf8') : null),
    builtInIds: () => ids,
  }
}

/** Text of a demo scenario. */
export const demo = (name: string): string =>
  readFileSync(join(import.meta.dirname, '../../scenarios-demo', `${name}.yaml`), 'utf8')

/** A link that reads without fault; what is given replaces or follows its lines. */
export function link(change: Readonly<Record<string, string | null>> = {}, more = ''): string {
  const lines: Record<string, string | null> = {
    format: '1',
    title: 'A lane',
    block: 'link',
    data_rate: '56 Gb/s',
    modulation: 'PAM-4',
    clocking: 'half-rate',
    error_ratio: '1e-6',
    nodes: '[P28]',
    ...change,
  }
  const written = Object.entries(lines).filter(([, value]) => value !== null)
  return `${written.map(([key, value]) => `${key}: ${value}`).join('\n')}\n${more}`
}

/** Where a text marked with § has its mark, and the text without it. */
export function marked(text: string): {
  readonly text: string
  readonly line: number
  readonly column: number
} {
  const before = text.slice(0, text.indexOf('§')).split('\n')
  return { text: text.replace('§', ''), line: before.length, column: before.at(-1)!.length + 1 }
}

/** Every fault of a scenario and its nodes. */
export async function faultsOf(
  text: string,
  files: Readonly<Record<string, string>> = {},
): Promise<readonly Fault[]> {
  const read = await loadScenario(text, 'a.yaml', accessTo(files))
  return read.ok ? [] : read.faults
}
