import { type KnownLeaf, KnownLeaves } from '../derivation/recorder.ts'
import { BOLTZMANN, CHARGE, type OperatingPoint } from '../device/conditions.ts'
import type { Provenance } from '../scenario/checked.ts'

/** Given numbers that every derivation of a case may rest on: the option's, the node's, and constants. */
export function givenLeaves(option: readonly Provenance[], node: readonly Provenance[]): KnownLeaves {
  const given = [...option, ...node].flatMap(leavesOf)
  return new KnownLeaves([...given, ...given.flatMap(byPolarity), BOLTZMANN, CHARGE])
}

/** The same with what an operating point adds. */
export function knownLeaves(given: KnownLeaves, at: OperatingPoint): KnownLeaves {
  return new KnownLeaves(pointLeaves(at), given)
}

function leavesOf(given: Provenance): readonly KnownLeaf[] {
  const { path, meaning, unit, source, value, usedBy } = given
  const used = usedBy === undefined ? {} : { usedBy }
  const symbol = given.symbol === '' ? (path.split('.').at(-1) ?? path) : given.symbol
  if (typeof value === 'number') return [{ symbol, meaning, unit, source, path, value, ...used }]
  if (!Array.isArray(value) || value.length !== 2 || typeof value[0] !== 'number') return []
  const [least, most] = value as [number, number]
  return [
    { symbol: `${symbol}_min`, meaning: `${meaning} (low end)`, unit, source, path, value: least, ...used },
    { symbol: `${symbol}_max`, meaning: `${meaning} (high end)`, unit, source, path, value: most, ...used },
  ]
}

/** Values of a transistor also go by their polarity where a formula speaks of both: `L_n`, `L_p`. */
function byPolarity(leaf: KnownLeaf): readonly KnownLeaf[] {
  const side = leaf.path?.startsWith('nmos.') ? 'n' : leaf.path?.startsWith('pmos.') ? 'p' : null
  return side === null ? [] : [{ ...leaf, symbol: `${leaf.symbol}_${side}` }]
}

function pointLeaves(at: OperatingPoint): readonly KnownLeaf[] {
  const source = `operating point: ${at.corner} corner`
  const leaf = (symbol: string, meaning: string, unit: string, value: number): KnownLeaf => ({
    symbol,
    meaning,
    unit,
    source,
    value,
  })
  const datum = (...about: Parameters<typeof leaf>): KnownLeaf => ({
    ...leaf(...about),
    source: 'definition: the typical device of published data',
  })
  return [
    leaf('T', 'junction temperature', 'K', at.T),
    leaf('c_mu', 'mobility factor of the corner', '1', at.c_mu),
    leaf('dV_T', 'threshold shift of the corner', 'V', at.dV_T),
    leaf('dV_age', 'threshold shift by ageing', 'V', at.dV_age),
    leaf('tol_V', 'supply tolerance taken', '1', at.tol_V),
    // The rule of thumb is measured on the typical device at 300 K without ageing.
    datum('T', 'temperature of published device data', 'K', 300),
    datum('c_mu', 'mobility factor of the typical corner', '1', 1),
    datum('dV_T', 'threshold shift of the typical corner', 'V', 0),
    datum('dV_age', 'no ageing', 'V', 0),
  ]
}
