import type { Provenance } from './checked.ts'
import type { Fault } from './fault.ts'
import { faultAt, type Place } from './fault.ts'
import { nearest } from './nearest.ts'
import { readChoice, readCount, readList, readRows, readTable, readText } from './reading-plain.ts'
import { readQuantity, readRange } from './reading-quantity.ts'
import { readRecord } from './reading-record.ts'
import type { Key, Keys } from './schema.ts'
import { inWords, type MapTree, type Tree } from './tree.ts'

/** Whose file is read: it decides the form of quantities and what provenance says. */
export interface Reading {
  readonly of: 'scenario' | 'node'
  readonly faults: Fault[]
  readonly provenance: Provenance[]
}

/** A value read, with what the provenance adds to it. */
export interface Read<T> {
  readonly value: T
  readonly note?: Partial<Pick<Provenance, 'source' | 'evidence' | 'spread'>>
}

/**
 * Reads a mapping against the declaration of its keys. Every fault goes into the reading; what could not be read
 * is null, and the caller must not use the values when there are faults.
 *
 * @param keys declaration
 * @param tree the mapping, or null for defaults only
 * @param path dotted path of the mapping, empty at the top
 * @param near where to tell what is missing when the mapping itself is not written; null for defaults only
 */
export function readKeys(
  keys: Keys,
  tree: MapTree | null,
  path: string,
  reading: Reading,
  near: Place | null = tree?.place ?? null,
): Readonly<Record<string, unknown>> {
  if (tree !== null) refuseUnknown(keys, tree, path, reading.faults)
  const values: Record<string, unknown> = {}
  const written = tree === null ? null : inIntervals(keys, tree)
  for (const [name, key] of Object.entries(keys)) {
    const entry = written?.entries.get(name)
    const at = path === '' ? name : `${path}.${name}`
    values[name] = readKey(key, entry?.value ?? null, at, entry?.at ?? near, reading)
  }
  return values
}

/** What is written in unit intervals under a key of time belongs to its companion, unless that is written too. */
function inIntervals(keys: Keys, tree: MapTree): MapTree {
  const moved = [...tree.entries].flatMap(([name, entry]) => {
    const key = Object.hasOwn(keys, name) ? keys[name]! : undefined
    const companion = key?.type === 'quantity' ? key.inUI : undefined
    if (companion === undefined || tree.entries.has(companion) || !countsIntervals(entry.value)) return []
    return [{ name, companion, entry }]
  })
  if (moved.length === 0) return tree
  const entries = new Map(tree.entries)
  for (const { name, companion, entry } of moved) {
    entries.delete(name)
    entries.set(companion, entry)
  }
  return { ...tree, entries }
}

/** Whether a value, or the first of an uncertain one, is written in UI. */
function countsIntervals(tree: Tree): boolean {
  if (tree.kind === 'map') {
    const [first] = tree.entries.values()
    return first !== undefined && countsIntervals(first.value)
  }
  return tree.kind === 'scalar' && /\b[a-zµμ]?UI$/.test(tree.text.trim())
}

/** Tells every key that is not declared, with the declared one nearest to it. */
export function refuseUnknown(keys: Keys, tree: MapTree, path: string, faults: Fault[]): void {
  const known = Object.keys(keys)
  for (const [name, { at }] of tree.entries) {
    if (Object.hasOwn(keys, name)) continue
    const near = nearest(name, known)
    const where = path === '' ? 'at the top' : `under \`${path}\``
    const allowed =
      known.length <= 16 ? known.join(', ') : `one of ${known.length} keys, see the key table of the guide`
    const remedy =
      near === null ? `remove it, or choose one that is known ${where}` : `did you mean \`${near}\`?`
    faults.push(faultAt(at, 'key.unknown', `\`${name}\` ${where}`, allowed, remedy))
  }
}

function readKey(key: Key, tree: Tree | null, path: string, near: Place | null, reading: Reading): unknown {
  const blank = tree !== null && tree.kind === 'scalar' && tree.is === 'null'
  if (key.type === 'section' && (tree === null || blank)) return null
  if (key.type === 'group' || key.type === 'section')
    return readGroup(key.keys, blank ? null : tree, path, near, reading)
  if (tree === null || blank) return absent(key, path, near, reading)
  const read = readLeaf(key, tree, path, reading)
  if (read === null) return null
  reading.provenance.push({
    path,
    symbol: key.symbol ?? '',
    meaning: key.meaning,
    value: read.value as Provenance['value'],
    unit: 'unit' in key ? key.unit : '1',
    ...('shown' in key && key.shown !== undefined ? { shown: key.shown } : {}),
    source: `${tree.place.file}, line ${tree.place.line}`,
    evidence: 'given',
    origin: reading.of,
    ...(key.usedBy === undefined ? {} : { usedBy: key.usedBy }),
    ...read.note,
  })
  return read.value
}

function readGroup(
  keys: Keys,
  tree: Tree | null,
  path: string,
  near: Place | null,
  reading: Reading,
): unknown {
  if (tree === null) return readKeys(keys, null, path, reading, near)
  if (tree.kind === 'map') return readKeys(keys, tree, path, reading)
  const names = Object.keys(keys).slice(0, 8).join(', ')
  reading.faults.push(
    faultAt(
      tree.place,
      'shape.mapping',
      inWords(tree),
      `a mapping with keys such as ${names}`,
      `write \`{key: value}\` or indented keys under \`${path}\``,
    ),
  )
  return null
}

type LeafKey = Exclude<Key, { readonly type: 'group' | 'section' }>

function readLeaf(key: LeafKey, tree: Tree, path: string, reading: Reading): Read<unknown> | null {
  switch (key.type) {
    case 'quantity':
      return reading.of === 'node' && key.uncertain !== false
        ? readRecord(key, tree, path, reading)
        : readQuantity(key, tree, path, reading)
    case 'range':
      return readRange(key, tree, path, reading)
    case 'count':
      return readCount(key, tree, path, reading)
    case 'choice':
      return readChoice(key, tree, path, reading)
    case 'text':
      return readText(key, tree, path, reading)
    case 'list':
      return readList(key, tree, path, reading)
    case 'table':
      return readTable(key, tree, path, reading)
    case 'rows':
      return readRows(key, tree, path, reading)
  }
}

/** A key that is not written: its default, null, or a fault when it is needed. */
function absent(key: LeafKey, path: string, near: Place | null, reading: Reading): unknown {
  if (key.type === 'table') return {}
  const fallback = 'default' in key ? key.default : undefined
  if (fallback === undefined) {
    if ('required' in key && key.required === true && near !== null) {
      reading.faults.push(faultAt(near, 'key.missing', `no \`${path}\``, key.meaning, `add \`${path}\``))
    }
    return null
  }
  const value = defaultValue(key)
  const source = key.source ?? ''
  reading.provenance.push({
    path,
    symbol: key.symbol ?? '',
    meaning: key.meaning,
    value: value as Provenance['value'],
    unit: 'unit' in key ? key.unit : '1',
    ...('shown' in key && key.shown !== undefined ? { shown: key.shown } : {}),
    source,
    evidence: evidenceOf(source),
    origin: 'default',
    ...(key.usedBy === undefined ? {} : { usedBy: key.usedBy }),
  })
  return value
}

/** The checked value of a declared default, read by the same readers as anything written. */
function defaultValue(key: LeafKey): unknown {
  const place: Place = { file: 'declaration', line: 1, column: 1 }
  const scalar = (text: string): Tree => ({ kind: 'scalar', place, text, is: 'text' })
  const faults: Fault[] = []
  const reading: Reading = { of: 'scenario', faults, provenance: [] }
  if (key.type === 'quantity') return readQuantity(key, scalar(key.default!), '', reading)?.value ?? null
  if (key.type === 'range') {
    const [low, high] = key.default!
    return (
      readRange(key, { kind: 'list', place, items: [scalar(low), scalar(high)] }, '', reading)?.value ?? null
    )
  }
  return 'default' in key ? key.default : null
}

/** How far a declared source is to be trusted, from its own words. */
export function evidenceOf(source: string): Provenance['evidence'] {
  if (source.startsWith('common practice')) return 'common practice'
  if (source.startsWith('estimate')) return 'estimate'
  return /^(method|derived|circuit theory)/.test(source) ? 'derived' : 'published'
}
