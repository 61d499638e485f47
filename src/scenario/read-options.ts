import type { OptionInput, Provenance } from './checked.ts'
import { type Fault, faultAt, type Place } from './fault.ts'
import { optionKeys, type ScenarioHead, type Settings, scenarioKeys } from './keys/index.ts'
import { optionHeadKeys } from './option-keys.ts'
import { withProfiles } from './profile-files.ts'
import { readKeys, refuseUnknown } from './reading.ts'
import {
  type FormulaParser,
  LONGEST_RULE,
  loadFormulaParser,
  readRule,
  type UserRule,
} from './rule-formula.ts'
import { crossFaults, type Written } from './rules.ts'
import { type Access, inWords, laidOver, type MapTree, picked, placeOf, type Tree, without } from './tree.ts'

/** Most options that a scenario may have. */
export const MOST_OPTIONS = 64

/** Other files that a scenario names, and every file read so far. */
export interface Outside {
  readonly access: Access
  readonly files: { file: string; text: string }[]
}

/** Reads every option: the scenario's keys with the option's own laid over them. */
export async function readOptions(
  tree: MapTree,
  base: MapTree,
  head: ScenarioHead,
  outside: Outside,
  faults: Fault[],
): Promise<readonly OptionInput[]> {
  const written = optionTrees(tree, base, faults)
  const parts: OptionTree[] = []
  for (const part of written) {
    const merged = await withProfiles(part.merged, outside.access, outside.files, faults)
    parts.push({ ...part, merged })
  }
  // Faults of keys that every option overrides are told as well; what is missing may still come from an option.
  const ofBase: Fault[] = []
  readKeys(optionKeys, picked(base, Object.keys(optionKeys)), '', {
    of: 'scenario',
    faults: ofBase,
    provenance: [],
  })
  faults.push(...ofBase.filter(({ code }) => code !== 'key.missing'))
  const parser = parts.some(({ merged }) => hasFormulas(merged)) ? await loadFormulaParser() : null
  return parts.map(({ id, label, merged, own }) => {
    const provenance: Provenance[] = []
    const settings = readKeys(optionKeys, picked(merged, Object.keys(optionKeys)), '', {
      of: 'scenario',
      faults,
      provenance,
    }) as Settings
    if (head.block != null) faults.push(...crossFaults(settings, head.block, writtenIn(merged, own ?? tree)))
    return { id, label, settings, provenance, rules: parser === null ? {} : rulesOf(merged, parser, faults) }
  })
}

interface OptionTree {
  readonly id: string
  readonly label: string
  readonly merged: MapTree
  readonly own: MapTree | null
}

function optionTrees(tree: MapTree, base: MapTree, faults: Fault[]): readonly OptionTree[] {
  const value = tree.entries.get('options')?.value
  if (value === undefined || (value.kind === 'scalar' && value.is === 'null')) {
    return [{ id: 'base', label: 'base', merged: withBlock(base, tree), own: null }]
  }
  if (value.kind !== 'list' || value.items.length === 0 || value.items.length > MOST_OPTIONS) {
    faults.push(
      faultAt(
        value.place,
        value.kind === 'list' && value.items.length > 0 ? 'list.too-long' : 'shape.list',
        value.kind === 'list' ? `${value.items.length} options` : inWords(value),
        `a list of 1 to ${MOST_OPTIONS} options`,
        'write `- {id: …, …}` a line',
      ),
    )
    return []
  }
  const seen = new Map<string, Place>()
  return value.items.flatMap((item) => optionTree(item, tree, base, seen, faults) ?? [])
}

const withBlock = (merged: MapTree, tree: MapTree): MapTree => {
  const block = tree.entries.get('block')
  return block === undefined ? merged : { ...merged, entries: new Map([...merged.entries, ['block', block]]) }
}

function optionTree(
  item: Tree,
  tree: MapTree,
  base: MapTree,
  seen: Map<string, Place>,
  faults: Fault[],
): OptionTree | null {
  if (item.kind !== 'map') {
    faults.push(
      faultAt(
        item.place,
        'shape.mapping',
        inWords(item),
        'a mapping with `id` and overrides',
        'write `- {id: …, …}`',
      ),
    )
    return null
  }
  const reading = { of: 'scenario' as const, faults, provenance: [] }
  const names = Object.keys(optionHeadKeys)
  const { id, label } = readKeys(optionHeadKeys, picked(item, names), '', reading) as {
    id: string | null
    label: string | null
  }
  const overrides = without(item, names)
  refuseStrangers(overrides, faults)
  const place = placeOf(item, 'id')
  // A faulty id stops nothing: what the option overrides is checked all the same.
  if (id !== null && seen.has(id)) {
    faults.push(
      faultAt(
        place,
        'option.duplicate',
        id,
        'each id once',
        `rename it; the first stands in line ${seen.get(id)!.line}`,
      ),
    )
  } else if (id !== null) seen.set(id, place)
  const merged = laidOver(base, { ...overrides, place: item.place }) as MapTree
  return { id: id ?? '', label: label ?? id ?? '', merged: withBlock(merged, tree), own: item }
}

/** An option is told its unknown keys here, once; the merged keys are read without them. */
function refuseStrangers(overrides: MapTree, faults: Fault[]): void {
  const ofScenario = Object.keys(scenarioKeys).filter((name) => overrides.entries.has(name))
  for (const name of ofScenario) {
    faults.push(
      faultAt(
        overrides.entries.get(name)!.at,
        'key.unknown',
        `\`${name}\` in an option`,
        'keys that an option may override',
        'move it to the top: all options share it',
      ),
    )
  }
  refuseUnknown(optionKeys, without(overrides, ofScenario), '', faults)
}

/** What the merged keys of an option say; what they do not say is told at the block, or where it is blanked. */
function writtenIn(merged: MapTree, near: MapTree): Written {
  const has = (path: string): boolean => {
    let at: Tree | undefined = merged
    for (const key of path.split('.')) at = at?.kind === 'map' ? at.entries.get(key)?.value : undefined
    return at !== undefined && !(at.kind === 'scalar' && at.is === 'null')
  }
  return {
    has,
    placeOf: (key) =>
      placeOf(merged.entries.has('block') ? merged : near, merged.entries.has(key) ? key : 'block'),
  }
}

const formulasOf = (tree: MapTree): MapTree | null => {
  const demand = tree.entries.get('demand')?.value
  const formulas = demand?.kind === 'map' ? demand.entries.get('formulas')?.value : undefined
  return formulas?.kind === 'map' ? formulas : null
}

const hasFormulas = (tree: MapTree): boolean => formulasOf(tree) !== null

function rulesOf(tree: MapTree, parse: FormulaParser, faults: Fault[]): Readonly<Record<string, UserRule>> {
  const rules: Record<string, UserRule> = {}
  for (const [name, { value }] of formulasOf(tree)?.entries ?? []) {
    // What is no text, or too long a one, is a fault of its form already.
    if (value.kind !== 'scalar' || value.is === 'null') continue
    // What is empty or too long has been told as a text already.
    if (value.text.trim() === '' || value.text.length > LONGEST_RULE) continue
    const read = readRule(value.text, value.place, parse)
    if (read.ok) rules[name] = read.rule
    else faults.push(read.fault)
  }
  return rules
}
