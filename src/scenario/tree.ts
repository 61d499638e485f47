import type { Fault, Place } from './fault.ts'

/** A file as read: mappings, lists and scalars, each with its place. What all checking works on. */
export type Tree = MapTree | ListTree | ScalarTree

export interface MapTree {
  readonly kind: 'map'
  readonly place: Place
  readonly entries: ReadonlyMap<string, Entry>
}

export interface Entry {
  readonly at: Place
  readonly value: Tree
}

export interface ListTree {
  readonly kind: 'list'
  readonly place: Place
  readonly items: readonly Tree[]
}

export interface ScalarTree {
  readonly kind: 'scalar'
  readonly place: Place
  /** As written, without quotes. */
  readonly text: string
  readonly is: 'null' | 'number' | 'text' | 'boolean'
}

/** What a scenario or a node file may name. Files, processes and clocks come in from outside. */
export interface Access {
  /** Text of a file, or null when it cannot be read. Paths are as written, relative to the naming file. */
  readonly read: (path: string, from: string) => { readonly file: string; readonly text: string } | null
  readonly builtIn: (id: string) => string | null
  readonly builtInIds: () => readonly string[]
}

/** Collects faults on the way; nothing is thrown. */
export interface Collecting {
  readonly faults: Fault[]
}

/** Keys by which a mapping is one value and not a group: it is replaced whole, never merged. */
const WHOLE = ['low', 'typical', 'high', 'mean', 'sigma', 'value']

const isWhole = (tree: MapTree): boolean => WHOLE.some((key) => tree.entries.has(key))

/** One tree laid over another: mappings merge key by key, everything else is replaced. */
export function laidOver(base: Tree, over: Tree): Tree {
  if (base.kind !== 'map' || over.kind !== 'map' || isWhole(base) || isWhole(over)) return over
  const entries = new Map(base.entries)
  for (const [key, entry] of over.entries) {
    const under = entries.get(key)
    entries.set(
      key,
      under === undefined ? entry : { at: entry.at, value: laidOver(under.value, entry.value) },
    )
  }
  return { kind: 'map', place: over.place, entries }
}

/** A mapping without some of its keys. */
export function without(tree: MapTree, keys: readonly string[]): MapTree {
  const entries = new Map([...tree.entries].filter(([key]) => !keys.includes(key)))
  return { ...tree, entries }
}

/** What stands there, in words for a message. */
export function inWords(tree: Tree): string {
  if (tree.kind === 'scalar') return tree.is === 'null' ? 'nothing' : tree.text
  return tree.kind === 'map' ? 'a mapping' : 'a list'
}

/** Where the value of a key stands; where the mapping stands when the key is not there. */
export const placeOf = (tree: MapTree, key: string): Place =>
  tree.entries.get(key)?.value.place ?? tree.entries.get(key)?.at ?? tree.place

/** A mapping with only some of its keys. */
export function picked(tree: MapTree, keys: readonly string[]): MapTree {
  return { ...tree, entries: new Map([...tree.entries].filter(([key]) => keys.includes(key))) }
}
