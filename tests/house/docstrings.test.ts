import { describe, expect, it } from 'vitest'
import { filesBelow, textAt } from './repository.ts'

/** The stages whose exported functions are the engineering. */
const ENGINEERING = ['numeric', 'device', 'blocks', 'clocking', 'link']

interface Declared {
  readonly name: string
  readonly doc: string | null
  /** Parameters of a formula; null for an ordinary function. */
  readonly parameters: readonly string[] | null
}

/** The doc comment that ends right before a place in the text, linter remarks aside. */
function docBefore(text: string, at: number): string | null {
  const before = text
    .slice(0, at)
    .replace(/(?:\s*\/\/ biome-ignore[^\n]*)+\s*$/, '')
    .trimEnd()
  if (!before.endsWith('*/')) return null
  const doc = before.slice(before.lastIndexOf('/**'))
  return doc.startsWith('/**') && doc.indexOf('*/') === doc.length - 2 ? doc : null
}

function declared(text: string): readonly Declared[] {
  const functions = [...text.matchAll(/^export (?:async )?function\*? (\w+)/gm)]
  const arrows = [
    ...text.matchAll(/^export const (\w+)(?::[^=]+)? = (?:async )?(?:<[^>]*>)?\([^)]*\)[^=\n]*=>/gm),
  ]
  const formulas = [...text.matchAll(/^export const (\w+) = formula\(\s*\{[\s\S]*?\},\s*\(([^)]*)\)\s*=>/gm)]
  const plainly = [...functions, ...arrows].map((match) => ({
    name: match[1]!,
    doc: docBefore(text, match.index),
    parameters: null,
  }))
  return [
    // The signatures of an overloaded function share the comment of the first.
    ...plainly.filter(({ name }, k) => plainly.findIndex((other) => other.name === name) === k),
    ...formulas.map((match) => ({
      name: match[1]!,
      doc: docBefore(text, match.index),
      parameters: match[2]!
        .split(',')
        .map((name) => name.trim())
        .filter((name) => name !== ''),
    })),
  ]
}

function faultsOf(path: string, text: string): readonly string[] {
  return declared(text).flatMap(({ name, doc, parameters }) => {
    if (doc === null) return [`${path}: ${name} has no docstring`]
    const unsaid = (parameters ?? []).filter((one) => !new RegExp(`(?<![\\w])${one} \\[[^\\]]+\\]`).test(doc))
    const unit =
      parameters !== null && !/→ \[[^\]]+\]/.test(doc) ? [`${path}: ${name} does not say → [unit]`] : []
    return [...unsaid.map((one) => `${path}: ${name} does not give the unit of ${one}`), ...unit]
  })
}

const sources = filesBelow('src').filter(
  (path) => path.endsWith('.ts') && ENGINEERING.includes(path.split('/')[1] ?? ''),
)

describe('docstrings', () => {
  it('every exported function says what it does, every formula the unit of each parameter and of its result', () => {
    expect(sources.flatMap((path) => declared(textAt(path))).length).toBeGreaterThan(40)
    expect(sources.flatMap((path) => faultsOf(path, textAt(path)))).toEqual([])
  })

  it('would notice what is missing', () => {
    expect(faultsOf('a.ts', 'export function f(x: number) {}')).toHaveLength(1)
    expect(faultsOf('a.ts', '/** Of g. */\nconst g = 1\nexport function f() {}')).toHaveLength(1)
    expect(faultsOf('a.ts', '/** Adds. */\nexport function f(x: number) {}')).toEqual([])
    const formula = 'export const f = formula(\n  { symbol: "a" },\n  (x, y_s) => x * y_s,\n)'
    expect(faultsOf('a.ts', `/** f = x y. x [m] → [m]. */\n${formula}`)).toHaveLength(1)
    expect(faultsOf('a.ts', `/** f = x y. x [m], y_s [1]. */\n${formula}`)).toHaveLength(1)
    expect(faultsOf('a.ts', `/** f = x y. x [m], y_s [1] → [m]. */\n${formula}`)).toEqual([])
  })
})
