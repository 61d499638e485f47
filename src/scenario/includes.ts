import { type Fault, faultAt, type Place } from './fault.ts'
import { type Access, inWords, laidOver, type MapTree, type Tree, without } from './tree.ts'
import { yamlTree } from './yaml-tree.ts'

const LONGEST_CHAIN = 16
/** A file included by several counts each time, or few files could ask for very many readings. */
const MOST_FILES = 40

/** The tree of a file laid over those it includes. */
export function withIncludes(
  source: string,
  file: string,
  access: Access,
  chain: readonly string[],
  files: { file: string; text: string }[],
  faults: Fault[],
): MapTree | null {
  files.push({ file, text: source })
  const read = yamlTree(source, file)
  faults.push(...read.faults)
  if (read.tree === null) return null
  if (read.tree.kind !== 'map') {
    faults.push(
      faultAt(
        read.tree.place,
        'shape.mapping',
        inWords(read.tree),
        'a mapping of keys',
        'begin with `format: 1`',
      ),
    )
    return null
  }
  let tree: Tree = read.tree
  for (const { name, place } of includes(read.tree).reverse()) {
    const below = included(name, place, file, access, chain, files, faults)
    if (below !== null) tree = laidOver(without(below, ['include']), tree)
  }
  return tree as MapTree
}

function included(
  name: string,
  place: Place,
  from: string,
  access: Access,
  chain: readonly string[],
  files: { file: string; text: string }[],
  faults: Fault[],
): MapTree | null {
  if (files.length > MOST_FILES) {
    const already = faults.some(({ code }) => code === 'include.too-many')
    if (!already)
      faults.push(
        faultAt(
          place,
          'include.too-many',
          `more than ${MOST_FILES} files`,
          `at most ${MOST_FILES} files, each counted as often as it is included`,
          'include less, or join the files',
        ),
      )
    return null
  }
  const found = access.read(name, from)
  if (found === null) {
    faults.push(
      faultAt(
        place,
        'file.missing',
        name,
        'a readable scenario file',
        'check the path; it is relative to this file',
      ),
    )
    return null
  }
  if (chain.includes(found.file) || chain.length >= LONGEST_CHAIN) {
    faults.push(
      faultAt(
        place,
        'include.cycle',
        [...chain, found.file].join(' → '),
        'files that do not include each other',
        'remove this include',
      ),
    )
    return null
  }
  return withIncludes(found.text, found.file, access, [...chain, found.file], files, faults)
}

function includes(tree: MapTree): { name: string; place: Place }[] {
  const value = tree.entries.get('include')?.value
  if (value === undefined) return []
  const items = value.kind === 'list' ? value.items : [value]
  return items.flatMap((item) =>
    item.kind === 'scalar' && item.text.trim() !== '' ? [{ name: item.text, place: item.place }] : [],
  )
}
