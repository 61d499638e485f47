import { formatQuantity } from '../quantity/format.ts'
import { faultAt } from './fault.ts'
import { nearest } from './nearest.ts'
import type { Read, Reading } from './reading.ts'
import { readNumber } from './reading-quantity.ts'
import type { ChoiceKey, CountKey, ListKey, RowsKey, TableKey, TextKey } from './schema.ts'
import { inWords, type ScalarTree, type Tree } from './tree.ts'

/** A whole number. */
export function readCount(key: CountKey, tree: Tree, path: string, { faults }: Reading): Read<number> | null {
  const text = inWords(tree)
  const allowed = key.min === key.max ? `only ${key.min}` : `a whole number from ${key.min} to ${key.max}`
  if (!/^[+-]?\d+$/.test(text)) {
    faults.push(
      faultAt(tree.place, 'number.not-whole', text, allowed, `write a whole number for \`${path}\``),
    )
    return null
  }
  const value = Number(text)
  if (value >= key.min && value <= key.max) return { value }
  const remedy = key.min === key.max ? `write \`${path}: ${key.min}\`` : 'choose a number inside'
  faults.push(faultAt(tree.place, 'number.out-of-range', text, allowed, remedy))
  return null
}

/** One word of a few. `yes` and `no` may also be written as YAML booleans. */
export function readChoice(
  key: ChoiceKey<string>,
  tree: Tree,
  path: string,
  { faults }: Reading,
): Read<string> | null {
  const text = inWords(tree)
  const word = text === 'true' ? 'yes' : text === 'false' ? 'no' : text
  if (key.among.includes(word)) return { value: word }
  const near = nearest(text, key.among)
  const remedy = near === null ? `choose one of these for \`${path}\`` : `did you mean \`${near}\`?`
  faults.push(faultAt(tree.place, 'choice.unknown', text, key.among.join(', '), remedy))
  return null
}

/** A text, in the form that is due. */
export function readText(key: TextKey, tree: Tree, path: string, { faults }: Reading): Read<string> | null {
  if (tree.kind !== 'scalar' || tree.text.trim() === '') {
    faults.push(
      faultAt(
        tree.place,
        'shape.text',
        tree.kind === 'scalar' ? 'an empty text' : inWords(tree),
        'a text',
        `write one text for \`${path}\`, or remove it`,
      ),
    )
    return null
  }
  if (tree.text.length > key.longest) {
    faults.push(
      faultAt(
        tree.place,
        'text.too-long',
        `${tree.text.length} characters`,
        `at most ${key.longest}`,
        'shorten it',
      ),
    )
    return null
  }
  if (key.pattern !== undefined && !key.pattern.is.test(tree.text)) {
    faults.push(faultAt(tree.place, 'text.form', tree.text, key.pattern.say, `mend \`${path}\``))
    return null
  }
  return { value: tree.text }
}

/** A list of texts, or of choices. A single text is read as a list of one. */
export function readList(
  key: ListKey,
  tree: Tree,
  path: string,
  reading: Reading,
): Read<readonly string[]> | null {
  const { faults } = reading
  if (tree.kind === 'map') {
    faults.push(faultAt(tree.place, 'shape.list', 'a mapping', 'a list', `write \`[…]\` for \`${path}\``))
    return null
  }
  const items = tree.kind === 'list' ? tree.items : [tree]
  if (items.length > key.longest || items.length === 0) {
    faults.push(
      faultAt(
        tree.place,
        items.length === 0 ? 'shape.list' : 'list.too-long',
        `${items.length} entries`,
        `1 to ${key.longest}`,
        'give one entry or more, but not too many',
      ),
    )
    return null
  }
  const texts = items.map((item) => listItem(key, item, path, reading))
  return texts.includes(null) ? null : { value: texts as string[] }
}

function listItem(key: ListKey, item: Tree, path: string, reading: Reading): string | null {
  if (key.among !== undefined) {
    return (
      readChoice({ type: 'choice', among: key.among, meaning: key.meaning }, item, path, reading)?.value ??
      null
    )
  }
  return readText({ type: 'text', meaning: key.meaning, longest: 400 }, item, path, reading)?.value ?? null
}

/** Numbers by name. */
export function readTable(
  key: TableKey,
  tree: Tree,
  path: string,
  reading: Reading,
): Read<Readonly<Record<string, number>>> | null {
  if (tree.kind !== 'map') {
    reading.faults.push(
      faultAt(
        tree.place,
        'shape.mapping',
        tree.kind === 'list' ? 'a list' : tree.text,
        'names with numbers',
        `write \`{name: number}\` for \`${path}\``,
      ),
    )
    return null
  }
  const values: [string, number | null][] = [...tree.entries].map(([name, { value }]) => [
    name,
    scalarNumber(key, value, `${path}.${name}`, reading),
  ])
  return values.some(([, value]) => value === null)
    ? null
    : { value: Object.fromEntries(values) as Record<string, number> }
}

function scalarNumber(key: TableKey, tree: Tree, path: string, reading: Reading): number | null {
  if (tree.kind === 'scalar' && tree.is !== 'null') return readNumber(key, tree, path, reading)
  reading.faults.push(
    faultAt(tree.place, 'number.unreadable', inWords(tree), 'a number', `write a number for \`${path}\``),
  )
  return null
}

/** Rows of numbers, one unit a column. */
export function readRows(
  key: RowsKey,
  tree: Tree,
  path: string,
  reading: Reading,
): Read<readonly (readonly number[])[]> | null {
  const due = `rows of [${key.columns.map(({ name, unit }) => `${name} with its unit (${unit})`).join(', ')}]`
  if (tree.kind !== 'list' || tree.items.length === 0) {
    reading.faults.push(
      faultAt(tree.place, 'rows.form', inWords(tree), due, `write a list of rows for \`${path}\``),
    )
    return null
  }
  if (tree.items.length > key.longest) {
    reading.faults.push(
      faultAt(
        tree.place,
        'list.too-long',
        `${tree.items.length} rows`,
        `at most ${key.longest}`,
        'thin the profile out',
      ),
    )
    return null
  }
  const rows = tree.items.map((row) => {
    if (
      row.kind !== 'list' ||
      row.items.length !== key.columns.length ||
      row.items.some(({ kind }) => kind !== 'scalar')
    ) {
      reading.faults.push(
        faultAt(
          row.place,
          'rows.form',
          row.kind === 'list' ? `${row.items.length} entries` : inWords(row),
          due,
          'write one number with its unit a column',
        ),
      )
      return null
    }
    return key.columns.map((column, k) => readNumber(column, row.items[k] as ScalarTree, path, reading))
  })
  if (rows.some((row) => row === null || row.includes(null))) return null
  return key.rising === true && !rises(rows as number[][], key, tree.items, reading)
    ? null
    : { value: rows as number[][] }
}

/** Whether the first column rises from row to row; every row that does not is a fault. */
function rises(
  rows: readonly (readonly number[])[],
  key: RowsKey,
  items: readonly Tree[],
  { faults }: Reading,
): boolean {
  const { name, unit } = key.columns[0]!
  const wrong = rows.flatMap(([value], k) => (k > 0 && value! <= rows[k - 1]![0]! ? [k] : []))
  for (const k of wrong) {
    const [before, value] = [rows[k - 1]![0]!, rows[k]![0]!]
    faults.push(
      faultAt(
        items[k]!.place,
        'profile.order',
        value === before
          ? `the ${name} ${formatQuantity(value, unit)} twice`
          : `the ${name} ${formatQuantity(value, unit)} after ${formatQuantity(before, unit)}`,
        `rising ${name}s, each once`,
        value === before ? 'remove one of the two rows' : 'sort the rows',
      ),
    )
  }
  return wrong.length === 0
}
