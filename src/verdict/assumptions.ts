import type { Node } from '../nodes/node.ts'
import type { OptionInput, Provenance } from '../scenario/checked.ts'
import type { Assumption } from './result.ts'

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
