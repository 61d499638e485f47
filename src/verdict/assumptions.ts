import type { Node } from '../nodes/node.ts'
import type { OptionInput, Provenance } from '../scenario/checked.ts'
import { evidenceOf } from '../scenario/reading.ts'
import type { Assumption, CaseResult } from './result.ts'

/** Every value used: the scenario's (once where all options share it, else per option), then the nodes'. */
export function assumptionsOf(
  options: readonly OptionInput[],
  nodes: readonly Node[],
): readonly Assumption[] {
  const [first, ...others] = options
  if (first === undefined) return []
  const paths = new Set(options.flatMap(({ provenance }) => provenance.map(({ path }) => path)))
  const scenario = [...paths].flatMap((path) => {
    const own = options.map((option) => option.provenance.find((given) => given.path === path))
    const shared = others.length === 0 || own.every((given) => sameValue(given, own[0]))
    if (shared) return own[0] === undefined ? [] : [assumption(path, own[0])]
    return own.flatMap((given, k) =>
      given === undefined ? [] : [assumption(`options.${options[k]!.id}.${path}`, given)],
    )
  })
  const ofNodes = nodes.flatMap(({ id, provenance }) =>
    provenance.map((given) => assumption(`nodes.${id}.${given.path}`, given)),
  )
  return [...scenario, ...ofNodes]
}

function sameValue(a: Provenance | undefined, b: Provenance | undefined): boolean {
  if (a === undefined || b === undefined) return a === b
  return JSON.stringify([a.value, a.spread]) === JSON.stringify([b.value, b.spread])
}

function assumption(path: string, given: Provenance): Assumption {
  const { value, unit, shown, source, evidence, origin, spread } = given
  return {
    path,
    value,
    ...(spread === undefined ? {} : { low: spread.low, high: spread.high }),
    unit,
    ...(shown === undefined ? {} : { shown }),
    source,
    evidence,
    origin,
  }
}

/** Sources of numbers that are not assumed: what is defined, a law, or the operating point itself. */
const NO_ASSUMPTION = /^(operating point|definition|law)/

/**
 * Constants of the method that the derivations rest on: neither scenario nor node states them. They are read off
 * the derivations, so they are known only where steps were written down.
 */
export function methodAssumptions(cases: readonly CaseResult[]): readonly Assumption[] {
  const found = new Map<string, Assumption>()
  for (const step of cases.flatMap(({ checks }) => checks.flatMap(({ steps }) => steps))) {
    const { kind, path, symbol, value, unit, source } = step
    if (kind !== 'leaf' || path !== undefined || NO_ASSUMPTION.test(source)) continue
    const same = found.get(`method.${symbol}`)
    const name =
      same === undefined || same.value === value ? `method.${symbol}` : `method.${symbol} (${step.meaning})`
    if (!found.has(name))
      found.set(name, { path: name, value, unit, source, evidence: evidenceOf(source), origin: 'default' })
  }
  return [...found.values()].sort((a, b) => (a.path < b.path ? -1 : 1))
}
