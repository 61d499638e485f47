import type { Assumption, Result } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'
import type { QuantityText } from '../text/quantity.ts'
import { assumedText, marksOf } from './assumptions.ts'
import type { NodeKeyRow } from './memo-model.ts'
import type { SourceList } from './steps.ts'

/** Keys that only name the file. */
const NAMING: ReadonlySet<string> = new Set(['format', 'id'])

/** Every key of the node files with its value in every node, in the order of the first node that has it. */
export function nodeKeyRows(
  { assumptions, nodes }: Result,
  sources: SourceList,
  write: QuantityText,
): readonly NodeKeyRow[] {
  const keys = new Map<string, Map<string, Assumption>>()
  for (const given of assumptions) {
    const owner = nodes.find(({ id }) => given.path.startsWith(`nodes.${id}.`))
    if (owner === undefined) continue
    const key = given.path.slice(`nodes.${owner.id}.`.length)
    if (NAMING.has(key)) continue
    const values = keys.get(key) ?? new Map<string, Assumption>()
    keys.set(key, values.set(owner.id, given))
  }
  return [...keys].map(([key, values]) => ({
    key: clean(key),
    cells: nodes.map(({ id }) => {
      const given = values.get(id)
      if (given === undefined) return { value: '–', evidence: '', marks: '', source: 0 }
      const { evidence, source } = given
      const value = assumedText(given, write)
      // What a file states about itself has its line as source, which nobody needs in the list.
      const number = evidence === 'given' ? 0 : sources.number(source)
      return { value, evidence: clean(evidence), marks: marksOf(given), source: number }
    }),
  }))
}
