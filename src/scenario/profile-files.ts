import type { CsvError, Info } from 'csv-parse/sync'
import { type Fault, faultAt, type Place } from './fault.ts'
import type { Access, Entry, ListTree, MapTree, ScalarTree, Tree } from './tree.ts'

/** Where a profile may be given as a file: group, key of the table, key of the file. */
const PLACES = [
  ['oscillator', 'phase_noise', 'phase_noise_file'],
  ['loop', 'reference_noise', 'reference_noise_file'],
] as const

/** What a file may look like, for messages. */
const DUE = 'a header such as `offset [Hz], phase noise [dBc/Hz]`, then one row of numbers an offset'

const PARSED = {
  bom: true,
  comment: '#',
  delimiter: [',', ';', '\t'],
  info: true,
  relax_column_count: true,
  skip_empty_lines: true,
  skip_records_with_empty_values: true,
  trim: true,
}

/** Longest profile file; more rows than the key admits are refused there. */
const LONGEST = 2 ** 20

/** Whether any profile of these keys is given as a file. */
export const namesProfiles = (tree: MapTree): boolean =>
  PLACES.some(([group, , file]) => scalarIn(tree, group, file) !== null)

/**
 * The keys with every profile file read into the table that it stands for, cell by cell with its place in the
 * file, so that all checks of a table hold for it. Asynchronous because the CSV reader is loaded only when needed.
 *
 * @param tree merged keys of an option
 * @param access other files; a path is relative to the file that names it
 * @param files every file read, for the hash in the memo
 * @param faults what is wrong goes here
 */
export async function withProfiles(
  tree: MapTree,
  access: Access,
  files: { file: string; text: string }[],
  faults: Fault[],
): Promise<MapTree> {
  if (!namesProfiles(tree)) return tree
  const { parse } = await import('csv-parse/sync')
  const read = (text: string): readonly Parsed[] => parse(text, PARSED) as unknown as readonly Parsed[]
  return PLACES.reduce((merged, [group, table, key]) => {
    const name = scalarIn(merged, group, key)
    if (name === null) return merged
    if (scalarOrList(merged, group, table)) {
      faults.push(
        faultAt(
          name.place,
          'profile.twice',
          `\`${key}\` beside \`${table}\``,
          'one of the two',
          `remove \`${table}\`, or write \`${table}: null\` here`,
        ),
      )
      return merged
    }
    const rows = rowsOf(name, access, files, faults, read)
    return rows === null ? merged : replaced(merged, group, table, { at: name.place, value: rows })
  }, tree)
}

interface Parsed {
  readonly info: Info
  readonly record: readonly string[]
}

function rowsOf(
  name: ScalarTree,
  access: Access,
  files: { file: string; text: string }[],
  faults: Fault[],
  parse: (text: string) => readonly Parsed[],
): ListTree | null {
  const found = access.read(name.text, name.place.file)
  if (found === null || found.text.length > LONGEST) {
    const code = found === null ? 'file.missing' : 'file.too-large'
    const remedy = found === null ? 'check the path; it is relative to this file' : 'thin the profile out'
    faults.push(faultAt(name.place, code, name.text, 'a readable CSV file', remedy))
    return null
  }
  const { file, text } = found
  if (!files.some((one) => one.file === file)) files.push({ file, text })
  try {
    return tabled(parse(text), file, text, faults)
  } catch (error) {
    const { message, lines } = error as CsvError
    const place = { file, line: Number(lines ?? 1), column: 1 }
    faults.push(faultAt(place, 'csv.form', message, DUE, 'mend the quotes of this line'))
    return null
  }
}

const HEADS = [/offset|frequency/i, /phase.?noise|level|^\s*L\b/i] as const

/** The rows as a list of [offset, phase noise], each number with the unit of its column. */
function tabled(records: readonly Parsed[], file: string, text: string, faults: Fault[]): ListTree | null {
  const lines = text.split(/\r\n|\r|\n/)
  const [head, ...rows] = records
  const columns = HEADS.map((is) => head?.record.findIndex((one) => is.test(one)) ?? -1)
  const units = columns.map((k) => /[[(]\s*([^\])]+?)\s*[\])]/.exec(head?.record[k] ?? '')?.[1] ?? null)
  const start: Place = { file, line: head?.info.lines ?? 1, column: 1 }
  if (columns.includes(-1) || units.includes(null) || rows.length === 0) {
    const header = head?.record.join(', ') ?? 'nothing'
    const found = rows.length === 0 ? `${header}, and no row` : header
    faults.push(faultAt(start, 'csv.form', found, DUE, 'name both columns with their units in brackets'))
    return null
  }
  const items = rows.map(({ info, record }): Tree => {
    const line = lines[info.lines - 1] ?? ''
    const cells = columns.map((k, j): Tree => {
      const cell = record[k] ?? ''
      const column = Math.max(0, cell === '' ? 0 : line.indexOf(cell)) + 1
      return {
        kind: 'scalar',
        place: { file, line: info.lines, column },
        text: `${cell} ${units[j]}`,
        is: 'text',
      }
    })
    return { kind: 'list', place: { file, line: info.lines, column: 1 }, items: cells }
  })
  return { kind: 'list', place: start, items }
}

function entryIn(tree: MapTree, group: string, key: string): Entry | null {
  const inside = tree.entries.get(group)?.value
  return inside?.kind === 'map' ? (inside.entries.get(key) ?? null) : null
}

/** A written, non-blank text under a group. */
function scalarIn(tree: MapTree, group: string, key: string): ScalarTree | null {
  const value = entryIn(tree, group, key)?.value
  return value?.kind === 'scalar' && value.is !== 'null' && value.text.trim() !== '' ? value : null
}

function scalarOrList(tree: MapTree, group: string, key: string): boolean {
  const value = entryIn(tree, group, key)?.value
  return value !== undefined && !(value.kind === 'scalar' && value.is === 'null')
}

function replaced(tree: MapTree, group: string, key: string, entry: Entry): MapTree {
  const { at, value } = tree.entries.get(group)!
  const inside = value as MapTree
  const entries = new Map(inside.entries).set(key, entry)
  return { ...tree, entries: new Map(tree.entries).set(group, { at, value: { ...inside, entries } }) }
}
