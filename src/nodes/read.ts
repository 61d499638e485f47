import type { Outcome, Provenance } from '../scenario/checked.ts'
import { type Fault, faultAt, type Place } from '../scenario/fault.ts'
import { nearest } from '../scenario/nearest.ts'
import { readKeys } from '../scenario/reading.ts'
import { type Access, inWords, laidOver, type MapTree, type Tree, without } from '../scenario/tree.ts'
import { yamlTree } from '../scenario/yaml-tree.ts'
import { type NodeValues, nodeKeys } from './keys.ts'
import type { Node } from './node.ts'

const LONGEST_CHAIN = 16
/** What a node never takes over from the one it is based on: it would pass for the other. */
const OWN = ['based_on', 'id', 'label', 'edition']

/** Nodes and every file that was read for them. */
export interface NodesRead {
  readonly nodes: readonly Node[]
  readonly files: readonly { readonly file: string; readonly text: string }[]
}

/** A node as a scenario names it: the id of a built-in class or the path of a file. */
export interface NodeName {
  readonly name: string
  readonly place: Place
}

/**
 * Reads the nodes that a scenario names.
 *
 * @param names ids of built-in classes, or paths relative to the scenario
 * @param from the scenario's file
 * @returns the nodes in the order named, or every fault found
 */
export function resolveNodes(
  names: readonly (string | NodeName)[],
  from: string,
  access: Access,
): Outcome<NodesRead> {
  const faults: Fault[] = []
  const files: { file: string; text: string }[] = []
  const seen = new Map<string, Place>()
  const nodes = names.flatMap((one) => {
    const named = typeof one === 'string' ? { name: one, place: { file: from, line: 0, column: 0 } } : one
    // A path is relative to the file that names it, which may be an included one.
    const node = namedNode(named, named.place.file, access, files, faults)
    if (node === null) return []
    if (seen.has(node.id)) {
      faults.push(
        faultAt(
          named.place,
          'node.duplicate',
          named.name,
          'each node once',
          'remove it, or give the file another id',
        ),
      )
      return []
    }
    seen.set(node.id, named.place)
    return [node]
  })
  return faults.length > 0 ? { ok: false, faults } : { ok: true, value: { nodes, files } }
}

/** Reads one node file on its own. */
export function readNode(text: string, file: string, access: Access): Outcome<Node> {
  const faults: Fault[] = []
  const node = readNodeText(text, file, access, [], faults)
  return node === null || faults.length > 0 ? { ok: false, faults } : { ok: true, value: node }
}

const isPath = (name: string): boolean => /[/\\]|\.(ya?ml|json)$/.test(name)

function namedNode(
  named: NodeName,
  from: string,
  access: Access,
  files: { file: string; text: string }[],
  faults: Fault[],
): Node | null {
  const found = sourceOf(named, from, access, faults)
  if (found === null) return null
  files.push(found)
  return readNodeText(found.text, found.file, access, [], faults)
}

/** Text of a node by id or path, or a fault. */
function sourceOf(
  { name, place }: NodeName,
  from: string,
  access: Access,
  faults: Fault[],
): { readonly file: string; readonly text: string } | null {
  if (isPath(name)) {
    const found = access.read(name, from)
    if (found === null)
      faults.push(
        faultAt(
          place,
          'file.missing',
          name,
          'a readable node file',
          'check the path; it is relative to this file',
        ),
      )
    return found
  }
  const text = access.builtIn(name)
  if (text !== null) return { file: `built-in/${name}.yaml`, text }
  const ids = access.builtInIds()
  const near = nearest(name, ids)
  const remedy =
    near === null ? 'choose a built-in class, or give the path of a node file' : `did you mean \`${near}\`?`
  faults.push(faultAt(place, 'node.unknown', name, `${ids.join(', ')}, or a path ending in .yaml`, remedy))
  return null
}

function readNodeText(
  text: string,
  file: string,
  access: Access,
  chain: readonly string[],
  faults: Fault[],
): Node | null {
  const merged = mergedTree(text, file, access, chain, faults)
  if (merged === null) return null
  const provenance: Provenance[] = []
  const found: Fault[] = []
  const reading = { of: 'node' as const, faults: found, provenance }
  const values = readKeys(nodeKeys, merged.tree, '', reading) as unknown as NodeValues
  faults.push(...found.filter(({ code }) => merged.complete || code !== 'key.missing'))
  const { id, label } = values
  return found.length > 0 || !merged.complete ? null : { id, label, values, provenance }
}

/** A node file laid over the one it is based on; not complete when that one cannot be had. */
interface Merged {
  readonly tree: MapTree
  readonly complete: boolean
}

function mergedTree(
  text: string,
  file: string,
  access: Access,
  chain: readonly string[],
  faults: Fault[],
): Merged | null {
  const { tree, faults: found } = yamlTree(text, file)
  faults.push(...found)
  if (tree === null) return null
  if (tree.kind !== 'map') {
    faults.push(
      faultAt(tree.place, 'shape.mapping', inWords(tree), 'a mapping of keys', 'begin with `format: 1`'),
    )
    return null
  }
  const base = tree.entries.get('based_on')?.value
  if (base?.kind !== 'scalar' || base.is === 'null') return { tree, complete: true }
  const from = sourceOf({ name: base.text, place: base.place }, file, access, faults)
  if (from === null) return { tree, complete: false }
  const line = [...chain, file]
  if (line.includes(from.file) || line.length >= LONGEST_CHAIN) {
    faults.push(
      faultAt(
        base.place,
        'include.cycle',
        [...line, from.file].join(' → '),
        'files that are not based on each other',
        'base it on a built-in class',
      ),
    )
    return { tree, complete: false }
  }
  const below = mergedTree(from.text, from.file, access, line, faults)
  if (below === null) return { tree, complete: false }
  const laid = laidOver(without(below.tree, OWN), tree as Tree) as MapTree
  return { tree: laid, complete: below.complete }
}
