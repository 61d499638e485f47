import { type Alias, type Document, isAlias, isMap, isScalar, isSeq, type Node as YamlNode } from 'yaml'
import { type Fault, faultAt, type Place } from './fault.ts'
import type { Entry, ScalarTree, Tree } from './tree.ts'

/** Deepest nesting of mappings and lists. */
export const DEEPEST = 32
/** Most values, those that aliases repeat counted each time. */
const MOST_VALUES = 50_000

const PLAIN_TAG = /^tag:yaml\.org,2002:(str|int|float|bool|null|map|seq)$/

/** Nesting beyond what a scenario can need. */
export const tooDeep = (place: Place): Fault =>
  faultAt(
    place,
    'yaml.too-deep',
    `more than ${DEEPEST} levels`,
    `at most ${DEEPEST} levels`,
    'flatten the nesting',
  )

/** What the walk has seen so far. */
interface Walk {
  readonly placeAt: (offset: number) => Place
  readonly faults: Fault[]
  readonly anchors: Map<string, YamlNode>
  readonly visited: Set<YamlNode>
  values: number
  /** A limit was passed: the rest is not looked at. */
  stopped: boolean
}

/**
 * Turns a parsed document into a tree with places, within the limits of depth and size.
 *
 * @param document without syntax errors
 * @param placeAt place of an offset in the text
 * @returns the tree with the faults of form found; null when a limit was passed
 */
export function walkDocument(
  document: Document.Parsed,
  placeAt: (offset: number) => Place,
  whole: Place,
): { readonly tree: Tree | null; readonly faults: readonly Fault[] } {
  const walk: Walk = {
    placeAt,
    faults: [],
    anchors: new Map(),
    visited: new Set(),
    values: 0,
    stopped: false,
  }
  const tree = treeOf(document.contents, 0, whole, walk)
  return { tree: walk.stopped ? null : tree, faults: walk.faults }
}

const blankAt = (place: Place): ScalarTree => ({ kind: 'scalar', place, text: '', is: 'null' })

function treeOf(node: YamlNode | null, depth: number, near: Place, walk: Walk): Tree {
  const place = node?.range ? walk.placeAt(node.range[0]) : near
  if (node === null || walk.stopped || passesLimit(depth, place, walk)) return blankAt(place)
  if (isAlias(node)) return aliased(node, depth, place, walk)
  rememberAnchor(node, walk)
  if (node.tag !== undefined && !PLAIN_TAG.test(node.tag))
    walk.faults.push(faultAt(place, 'yaml.tag', node.tag, 'no tag', 'remove the tag'))
  if (isMap(node)) return mapping(node.items as readonly Pair[], depth, place, walk)
  if (isSeq(node)) {
    const items = node.items.map((item) => treeOf(item as YamlNode | null, depth + 1, place, walk))
    return { kind: 'list', place, items }
  }
  return isScalar(node) ? scalar(node.value, node.source, place) : blankAt(place)
}

function passesLimit(depth: number, place: Place, walk: Walk): boolean {
  walk.values++
  if (walk.values > MOST_VALUES) {
    walk.faults.push(
      faultAt(
        place,
        'yaml.aliases',
        'more than 50 000 values',
        'a file without multiplying aliases',
        'write the values out, or keep bulk data in files of their own',
      ),
    )
  } else if (depth > DEEPEST) walk.faults.push(tooDeep(place))
  else return false
  walk.stopped = true
  return true
}

/** An anchor counts from where it stands; walking it again through an alias does not define it again. */
function rememberAnchor(node: YamlNode, { anchors, visited }: Walk): void {
  const { anchor } = node as { anchor?: string }
  if (anchor === undefined || visited.has(node)) return
  visited.add(node)
  anchors.set(anchor, node)
}

function aliased(node: Alias, depth: number, place: Place, walk: Walk): Tree {
  const named = walk.anchors.get(node.source)
  if (named !== undefined) return treeOf(named, depth, place, walk)
  walk.faults.push(
    faultAt(
      place,
      'yaml.alias-unknown',
      `*${node.source}`,
      'an anchor that stands above',
      `define \`&${node.source}\` first, or quote a text that begins with \`*\``,
    ),
  )
  return blankAt(place)
}

interface Pair {
  readonly key: unknown
  readonly value: unknown
}

function mapping(items: readonly Pair[], depth: number, place: Place, walk: Walk): Tree {
  const entries = new Map<string, Entry>()
  for (const { key, value } of items) {
    const at = isScalar(key) && key.range ? walk.placeAt(key.range[0]) : place
    const name = isScalar(key) ? String(key.value) : '?'
    if (entries.has(name)) {
      const first = entries.get(name)!.at.line
      walk.faults.push(
        faultAt(
          at,
          'yaml.duplicate-key',
          `\`${name}\` again`,
          'each key once',
          `remove one of them; the first stands in line ${first}`,
        ),
      )
    }
    entries.set(name, { at, value: treeOf(value as YamlNode | null, depth + 1, at, walk) })
  }
  return { kind: 'map', place, entries }
}

function scalar(value: unknown, source: string | undefined, place: Place): ScalarTree {
  if (value === null || value === undefined) return blankAt(place)
  if (typeof value === 'number' || typeof value === 'bigint')
    return { kind: 'scalar', place, text: source ?? String(value), is: 'number' }
  if (typeof value === 'boolean')
    return { kind: 'scalar', place, text: source ?? String(value), is: 'boolean' }
  return { kind: 'scalar', place, text: String(value), is: 'text' }
}
