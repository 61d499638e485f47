import { readdirSync, readFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { type Loaded, loadScenario } from '../../src/nodes/load.ts'
import { faultLine } from '../../src/scenario/fault.ts'
import type { Access } from '../../src/scenario/tree.ts'
import { evaluateScenario } from '../../src/verdict/evaluate.ts'
import type { Result } from '../../src/verdict/result.ts'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))
const CLASSES = join(ROOT, 'src/nodes/classes')
const DEMOS = join(ROOT, 'scenarios-demo')

const textOr = (file: string): string | null => {
  try {
    return readFileSync(file, 'utf8')
  } catch {
    return null
  }
}

/** Files of this machine and the built-in node classes, for tests. */
export const access: Access = {
  read: (path, from) => {
    const file = join(dirname(from), path)
    const text = textOr(file)
    return text === null ? null : { file, text }
  },
  builtIn: (id) => textOr(join(CLASSES, `${id}.yaml`)),
  builtInIds: () => readdirSync(CLASSES).map((name) => name.replace('.yaml', '')),
}

export const DEMO_NAMES = readdirSync(DEMOS).filter((name) => name.endsWith('.yaml'))

/** Reads text as a scenario; throws its faults. */
export async function loaded(text: string, file: string): Promise<Loaded> {
  const read = await loadScenario(text, file, access)
  if (!read.ok) throw new Error(read.faults.map(faultLine).join('\n'))
  return read.value
}

/** Evaluates a scenario text. */
export async function resultOf(text: string, file: string, explain: boolean): Promise<Result> {
  const { scenario, nodes } = await loaded(text, file)
  return evaluateScenario(scenario, nodes, {
    tool: { name: 'tapeworthy', version: 'test' },
    inputs: [],
    explain,
  })
}

/** Text of a demo scenario. */
export const demoText = (name: string): string => readFileSync(join(DEMOS, name), 'utf8')
export const demoFile = (name: string): string => join(DEMOS, name)
