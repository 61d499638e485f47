import type { Outcome, Scenario } from '../scenario/checked.ts'
import { inOrder } from '../scenario/fault.ts'
import { readScenarioParts } from '../scenario/read.ts'
import type { Access } from '../scenario/tree.ts'
import type { Node } from './node.ts'
import { resolveNodes } from './read.ts'

/** A scenario with the nodes it names and every file that was read. */
export interface Loaded {
  readonly scenario: Scenario
  readonly nodes: readonly Node[]
  readonly files: readonly { readonly file: string; readonly text: string }[]
}

/** Reads a scenario and its nodes, and reports the faults of both together. */
export async function loadScenario(text: string, file: string, access: Access): Promise<Outcome<Loaded>> {
  const { scenario, nodeNames, faults } = await readScenarioParts(text, file, access)
  const found = resolveNodes(nodeNames, file, access)
  const all = inOrder([...faults, ...(found.ok ? [] : found.faults)])
  if (scenario === null || !found.ok || all.length > 0) return { ok: false, faults: all }
  return {
    ok: true,
    value: { scenario, nodes: found.value.nodes, files: [...scenario.files, ...found.value.files] },
  }
}
