import type { Outcome, Provenance, Scenario } from './checked.ts'
import { type Fault, inOrder, type Place } from './fault.ts'
import type { FaultCode } from './fault-codes.ts'
import { withIncludes } from './includes.ts'
import { optionKeys, type ScenarioHead, scenarioKeys } from './keys/index.ts'
import { MOST_OPTIONS, readOptions } from './read-options.ts'
import { readKeys, refuseUnknown } from './reading.ts'
import { dateFault } from './rules.ts'
import { type Keys, list } from './schema.ts'
import { type Access, type MapTree, picked, placeOf, without } from './tree.ts'

/** Codes by which an included file could not be read, and those it might have spared us. */
const UNREAD = /^(?:file\.|include\.|yaml\.(?:syntax|documents|too-deep|aliases)$)/
const MISSING: readonly FaultCode[] = ['key.missing', 'oscillator.missing']

/** A scenario as far as it could be read: its faults, and the node names with their places in any case. */
export interface ScenarioRead {
  readonly scenario: Scenario | null
  readonly nodeNames: readonly { readonly name: string; readonly place: Place }[]
  readonly faults: readonly Fault[]
}

/**
 * Reads a scenario file with everything it includes.
 *
 * @param source its text
 * @param file its name as the user wrote it; faults name it so
 * @param access other files, and the built-in node classes
 * @returns the checked scenario in SI, or every fault found. Asynchronous because the parser of rule formulas is
 * loaded only when a scenario has any.
 */
export async function readScenario(source: string, file: string, access: Access): Promise<Outcome<Scenario>> {
  const { scenario, faults } = await readScenarioParts(source, file, access)
  return scenario === null || faults.length > 0 ? { ok: false, faults } : { ok: true, value: scenario }
}

/** As {@link readScenario}, but tells the nodes too when something else is faulty, so that they can be checked as well. */
export async function readScenarioParts(source: string, file: string, access: Access): Promise<ScenarioRead> {
  const files: { file: string; text: string }[] = []
  const faults: Fault[] = []
  const tree = withIncludes(source, file, access, [file], files, faults)
  if (tree === null) return { scenario: null, nodeNames: [], faults }
  const complete = !faults.some(({ code }) => UNREAD.test(code))
  refuseUnknownAtTop(tree, faults)
  const provenance: Provenance[] = []
  const head = readKeys(scenarioKeys, picked(tree, Object.keys(scenarioKeys)), '', {
    of: 'scenario',
    faults,
    provenance,
  }) as ScenarioHead
  if (head.date !== null && head.date !== undefined)
    faults.push(...dateFault(head.date, placeOf(tree, 'date')))
  const base = without(tree, [...Object.keys(scenarioKeys), 'options'])
  const options = await readOptions(tree, base, head, { access, files }, faults)
  const unique = inOrder(complete ? faults : faults.filter(({ code }) => !MISSING.includes(code)))
  return {
    scenario: unique.length > 0 ? null : { head, options, files },
    nodeNames: nodeNames(tree),
    faults: unique,
  }
}

function nodeNames(tree: MapTree): ScenarioRead['nodeNames'] {
  const value = tree.entries.get('nodes')?.value
  if (value === undefined) return []
  // Too many are a fault already; reading them all would only take long.
  const items = value.kind === 'list' ? value.items.slice(0, scenarioKeys.nodes.longest) : [value]
  return items.flatMap((item) =>
    item.kind === 'scalar' && item.text !== '' ? [{ name: item.text, place: item.place }] : [],
  )
}

/** Unknown keys at the top are told once, against all that may stand there. */
function refuseUnknownAtTop(tree: MapTree, faults: Fault[]): void {
  const options = list({ meaning: 'Alternatives.', longest: MOST_OPTIONS })
  const all: Keys = { ...scenarioKeys, ...optionKeys, options }
  refuseUnknown(all, tree, '', faults)
}
