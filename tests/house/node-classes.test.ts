import { describe, expect, it } from 'vitest'
import { parse } from 'yaml'
import { filesBelow, textAt } from './repository.ts'

const EVIDENCE = ['published', 'derived', 'common practice', 'estimate', 'invented', 'given']
/** Keys that say what a node is; all others are quantities and need a source. */
const ABOUT = new Set(['format', 'id', 'label', 'based_on', 'class', 'kind', 'edition'])

type Given = Readonly<Record<string, unknown>>
const isMap = (value: unknown): value is Given =>
  typeof value === 'object' && value !== null && !Array.isArray(value)

/** Every value below a place that has no record of value, source and evidence. */
function unsourced(path: string, given: unknown): readonly string[] {
  if (!isMap(given)) return [`${path}: a bare value`]
  if (!('value' in given) && !('low' in given)) {
    return Object.entries(given).flatMap(([key, inner]) => unsourced(`${path}.${key}`, inner))
  }
  const { source, evidence } = given
  const sourced = typeof source === 'string' && source.trim().length >= 5
  return [
    ...(sourced ? [] : [`${path}: no source`]),
    ...(EVIDENCE.includes(evidence as string) ? [] : [`${path}: evidence is ${String(evidence)}`]),
  ]
}

const classes = filesBelow('src/nodes/classes').filter((path) => path.endsWith('.yaml'))

describe('built-in node classes', () => {
  it('cover 180 nm to 3 nm', () => {
    const sizes = classes.map((path) => Number.parseFloat(String((parse(textAt(path)) as Given).class)))
    for (const size of [180, 130, 90, 65, 40, 28, 22, 16, 10, 7, 5, 3]) expect(sizes).toContain(size)
  })

  it.each(classes)(
    '%s states a source and its evidence on every value, and is named after its id',
    (path) => {
      const node = parse(textAt(path)) as Given
      const faults = Object.entries(node).flatMap(([key, inner]) =>
        ABOUT.has(key) ? [] : unsourced(key, inner),
      )
      expect(faults).toEqual([])
      expect(path.endsWith(`/${String(node.id)}.yaml`)).toBe(true)
    },
  )
})
