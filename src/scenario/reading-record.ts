import { faultAt } from './fault.ts'
import { nearest } from './nearest.ts'
import type { Read, Reading } from './reading.ts'
import { membersText, readMember } from './reading-quantity.ts'
import type { QuantityKey } from './schema.ts'
import type { MapTree, Tree } from './tree.ts'

const RECORD = ['value', 'source', 'evidence', 'low', 'high']
const EVIDENCE = ['published', 'derived', 'common practice', 'estimate', 'invented', 'given']

/** `{value, source, evidence, low, high}` of a node file. */
export function readRecord(
  key: QuantityKey,
  tree: Tree,
  path: string,
  reading: Reading,
): Read<number> | null {
  const { faults } = reading
  const form = '{value, source, evidence}'
  if (tree.kind !== 'map' || !tree.entries.has('value')) {
    faults.push(
      faultAt(
        tree.place,
        'source.missing',
        tree.kind === 'scalar' ? `${tree.text} without a source` : 'no value',
        form,
        `write \`${path}: {value: …, source: "where it comes from"}\``,
      ),
    )
    return null
  }
  for (const [name, { at }] of tree.entries) {
    if (RECORD.includes(name)) continue
    const near = nearest(name, RECORD)
    const remedy = near === null ? 'remove it' : `did you mean \`${near}\`?`
    faults.push(faultAt(at, 'key.unknown', `\`${name}\` under \`${path}\``, RECORD.join(', '), remedy))
  }
  const value = readMember(key, tree, 'value', path, reading)
  const source = textOf(tree, 'source')
  if (source === null)
    faults.push(
      faultAt(
        tree.place,
        'source.missing',
        `no \`source\` under \`${path}\``,
        form,
        'say where the value comes from',
      ),
    )
  const stated = tree.entries.get('evidence')
  const evidence = stated === undefined ? 'given' : (textOf(tree, 'evidence') ?? '')
  if (!EVIDENCE.includes(evidence)) {
    faults.push(
      faultAt(
        stated!.value.place,
        'choice.unknown',
        evidence === '' ? 'no word' : evidence,
        EVIDENCE.join(', '),
        'choose one of these',
      ),
    )
  }
  const ends = ['low', 'high'].map((name) =>
    tree.entries.has(name) ? readMember(key, tree, name, path, reading) : null,
  )
  if (value === null || source === null) return null
  const [low, high] = [ends[0] ?? value, ends[1] ?? value]
  if (low > value || value > high) {
    faults.push(
      faultAt(
        tree.place,
        'uncertain.order',
        membersText(tree, ['low', 'value', 'high']),
        'low ≤ value ≤ high',
        'put the smallest value under `low`',
      ),
    )
    return null
  }
  const spread = low === high ? {} : { spread: { low, typical: value, high } }
  return { value, note: { source, evidence, ...spread } }
}

function textOf(tree: MapTree, name: string): string | null {
  const value = tree.entries.get(name)?.value
  return value?.kind === 'scalar' && value.is !== 'null' && value.text.trim() !== '' ? value.text : null
}
