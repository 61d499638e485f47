import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { all, create, type MathJsInstance, type Unit } from 'mathjs'
import { describe, expect, it } from 'vitest'
import { formula as declare, type Formula } from '../../src/derivation/formula.ts'
import { filesBelow, ROOT, textAt } from './repository.ts'

const math = create(all!) as MathJsInstance

/** A unit of a doc comment or declaration in the notation of mathjs; ratios, levels and counts have none. */
function read(unit: string): string {
  const plain = unit
    .replace(/Ω|\bohm\b/g, 'ohm')
    .replace(/□/g, '')
    .replace(/²/g, '^2')
    .replace(/³/g, '^3')
    .replace(/[·]/g, '*')
    .replace(/\bbit\/s\b|\bb\/s\b|\bBd\b/g, 'Hz')
    .replace(/\bdBc\/Hz\b|\bdBc\b|\bdB\b|\bUI\b|%/g, '1')
    .replace(/\/bit\b/g, '')
    .trim()
  return plain.replace(/(?<=[A-Za-z\d)])\s+(?=[A-Za-z(])/g, '*')
}

/** A value of about one with its unit, a bare number when it has none. */
function valued(unit: string, size: number): number | Unit {
  const text = read(unit)
  return text === '1' || text === '' ? size : math.unit(size, text)
}

interface Declared {
  readonly path: string
  readonly name: string
  readonly formula: Formula<number[]>
  readonly doc: string
}

async function declaredIn(path: string): Promise<readonly Declared[]> {
  const text = textAt(path)
  if (!/^export const \w+ = formula\(/m.test(text)) return []
  const module = (await import(pathToFileURL(join(ROOT, path)).href)) as Readonly<Record<string, unknown>>
  return [...text.matchAll(/^export const (\w+) = formula\(/gm)].map(({ 1: name, index }) => ({
    path,
    name: name!,
    formula: module[name!] as Formula<number[]>,
    doc: text.slice(text.lastIndexOf('/**', index), index),
  }))
}

/** Dimensions of the declared result and of what the expression yields; the same when the formula is right. */
function faultOf({ path, name, formula, doc }: Declared): readonly string[] {
  const { parameters, expression } = formula.text
  const unitOf = (one: string): string =>
    [...doc.matchAll(new RegExp(`(?<![\\w])${one} \\[([^\\]]+)\\]`, 'g'))].at(-1)?.[1] ?? 'nothing stated'
  const promised = doc.match(/→ \[([^\]]+)\]/)?.[1] ?? 'nothing stated'
  try {
    const scope = Object.fromEntries(parameters.map((one, k) => [one, valued(unitOf(one), 1.1 + 0.13 * k)]))
    const found: unknown = math.evaluate(expression, scope)
    const wanted = valued(formula.unit, 1)
    if (!alike(wanted, valued(promised, 1)))
      return [`${path}: ${name} is ${formula.unit} in one place, ${promised} in the other`]
    return alike(found, wanted) ? [] : [`${path}: ${name} yields ${String(found)}, not ${formula.unit}`]
  } catch (error) {
    return [`${path}: ${name}: ${(error as Error).message}`]
  }
}

function alike(a: unknown, b: unknown): boolean {
  if (typeof a === 'number' || typeof b === 'number') return typeof a === typeof b
  return (a as Unit).equalBase(b as Unit)
}

/** Empirical forms whose constants carry a unit of their own, with what is inside. */
const EMPIRICAL: Readonly<Record<string, string>> = {
  mobility: '(T/300 K)^−1.3',
  saturationVelocity: '(T/300 K)^−0.5',
  threshold: '0.7 mV/K above 300 K',
  admissibleDensity: 'a step at 105 °C',
}
/** Forms that hold for any unit. */
const ANY_UNIT = /\[any\b[^\]]*\]/

const formulas = (
  await Promise.all(
    filesBelow('src')
      .filter((path) => path.endsWith('.ts'))
      .map(declaredIn),
  )
).flat()

describe('units of formulas', () => {
  it('every formula turns the units of its parameters into the unit it promises (law)', () => {
    expect(formulas.length).toBeGreaterThan(30)
    const plain = formulas.filter(({ name, doc }) => EMPIRICAL[name] === undefined && !ANY_UNIT.test(doc))
    expect(plain.flatMap(faultOf)).toEqual([])
  })

  it('the exceptions are needed', () => {
    const excepted = formulas.filter(({ name }) => EMPIRICAL[name] !== undefined)
    expect(excepted.map(({ name }) => name).sort()).toEqual(Object.keys(EMPIRICAL).sort())
    for (const one of excepted) expect(faultOf(one)).toHaveLength(1)
  })

  it('every formula names its source', () => {
    expect(
      formulas.filter(({ formula }) => formula.source.trim().length < 5).map(({ name }) => name),
    ).toEqual([])
  })

  it('would notice a wrong unit', () => {
    const about = { symbol: 'x', meaning: 'x', source: 'law', unit: 'Hz' }
    const wrong = declare(about, (C, R) => R! / C!)
    const right = declare(about, (C, R) => 1 / (R! * C!))
    const doc = '/** C [F], R [Ω] → [Hz]. */'
    expect(faultOf({ path: 'a', name: 'wrong', formula: wrong, doc })).toHaveLength(1)
    expect(faultOf({ path: 'a', name: 'right', formula: right, doc })).toEqual([])
  })
})
