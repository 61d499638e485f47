import { type NodeValues, nodeKeys } from '../nodes/keys.ts'
import type { QuantityKey } from '../scenario/schema.ts'

/** What follows when two nodes exchange one of their values. */
export interface ExchangeRow {
  /** Dotted path of the value, such as `nmos.V_T0`. */
  readonly path: string
  readonly symbol: string
  readonly meaning: string
  /** SI unit of the two values and unit for display. */
  readonly unit: string
  readonly shown: string
  readonly valueA: number
  readonly valueB: number
  /** Speed of A holding B's value and of B holding A's [Hz]; null where no operating point exists. */
  readonly speedA: number | null
  readonly speedB: number | null
  /** Whether the exchange turns the order of the two round. */
  readonly reverses: boolean
}

/** Two nodes as they are, and every exchange of one value between them. */
export interface ExchangeStudy {
  readonly speedA: number | null
  readonly speedB: number | null
  readonly rows: readonly ExchangeRow[]
}

/** Values that speed under headroom rests on; the spread of corners and the supply tolerance are alike. */
const NMOS_VALUES = ['V_T0', 'n', 'L', 'mu0', 'v_sat', 'C_ox', 'C_ext', 'C_lay', 'R_s', 'J_max'] as const

interface Exchangeable {
  readonly path: string
  readonly key: QuantityKey & { readonly symbol: string }
  readonly of: (node: NodeValues) => number
  readonly put: (node: NodeValues, value: number) => NodeValues
}

const SUPPLY: Exchangeable = {
  path: 'supply.core',
  key: nodeKeys.supply.keys.core,
  of: (node) => node.supply.core,
  put: (node, core) => ({ ...node, supply: { ...node.supply, core } }),
}

const EXCHANGEABLE: readonly Exchangeable[] = [
  SUPPLY,
  ...NMOS_VALUES.map((name) => ({
    path: `nmos.${name}`,
    key: nodeKeys.nmos.keys[name],
    of: (node: NodeValues) => node.nmos[name],
    put: (node: NodeValues, value: number) => ({ ...node, nmos: { ...node.nmos, [name]: value } }),
  })),
]

/**
 * Which single value, exchanged between two nodes, reverses the order of their speeds: shows a reader on what
 * the order rests. No value is varied by an invented amount, each node takes the other's own.
 *
 * @param a one node, SI
 * @param b the other
 * @param speedOf available speed of a node [Hz], null when it has no operating point (slower than any speed)
 * @returns both speeds as they are and one row for each value, those that reverse the order first
 */
export function exchangeStudy(
  a: NodeValues,
  b: NodeValues,
  speedOf: (node: NodeValues) => number | null,
): ExchangeStudy {
  const [speedA, speedB] = [speedOf(a), speedOf(b)]
  const before = Math.sign(orderOf(speedA) - orderOf(speedB))
  const rows = EXCHANGEABLE.map((value) => {
    const [valueA, valueB] = [value.of(a), value.of(b)]
    const exchanged = [speedOf(value.put(a, valueB)), speedOf(value.put(b, valueA))] as const
    const { symbol, meaning, unit, shown } = value.key
    return {
      path: value.path,
      symbol,
      meaning,
      unit,
      shown: shown ?? unit,
      valueA,
      valueB,
      speedA: exchanged[0],
      speedB: exchanged[1],
      reverses: Math.sign(orderOf(exchanged[0]) - orderOf(exchanged[1])) === -before && before !== 0,
    }
  })
  return { speedA, speedB, rows: rows.toSorted((p, q) => Number(q.reverses) - Number(p.reverses)) }
}

/** A stage that has no operating point is slower than any that has one. */
const orderOf = (speed: number | null): number => speed ?? -1
