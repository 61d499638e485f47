import { formatQuantity } from '../quantity/format.ts'
import { parseQuantity, type QuantityFault } from '../quantity/parse-quantity.ts'
import type { Spread } from './checked.ts'
import { faultAt } from './fault.ts'
import type { Read, Reading } from './reading.ts'
import type { QuantityKey, RangeKey } from './schema.ts'
import type { MapTree, ScalarTree, Tree } from './tree.ts'

type Limits = Pick<QuantityKey, 'unit' | 'shown' | 'min' | 'max'>

/** 95th percentile of the standard normal distribution. */
const Z95 = 1.6448536269514722

/** A quantity: one value or an uncertain one. */
export function readQuantity(
  key: QuantityKey,
  tree: Tree,
  path: string,
  reading: Reading,
): Read<number> | null {
  if (tree.kind === 'scalar') return wrapped(readNumber(key, tree, path, reading))
  if (tree.kind === 'list') {
    reading.faults.push(
      faultAt(
        tree.place,
        'uncertain.form',
        'a list',
        'one value or {low, typical, high}',
        'write a single value with its unit',
      ),
    )
    return null
  }
  if (key.uncertain === false) {
    reading.faults.push(
      faultAt(
        tree.place,
        'uncertain.not-allowed',
        'an uncertain value',
        'one value',
        `write a single value for \`${path}\``,
      ),
    )
    return null
  }
  return readUncertain(key, tree, path, reading)
}

const wrapped = (value: number | null): Read<number> | null => (value === null ? null : { value })

/** A single number in SI, inside its limits. */
export function readNumber(key: Limits, tree: ScalarTree, path: string, { faults }: Reading): number | null {
  if (tree.is === 'number' && !/\d/.test(tree.text)) {
    faults.push(faultAt(tree.place, 'number.not-finite', tree.text, limitsText(key), 'write a finite number'))
    return null
  }
  if (tree.is === 'boolean') {
    faults.push(
      faultAt(tree.place, 'number.unreadable', tree.text, exampleText(key), `write a number for \`${path}\``),
    )
    return null
  }
  const read = parseQuantity(tree.text, key.unit)
  if (!read.ok) {
    faults.push(unitFault(read.fault, key, tree, path))
    return null
  }
  if (!Number.isFinite(read.value)) {
    faults.push(faultAt(tree.place, 'number.not-finite', tree.text, limitsText(key), 'write a finite number'))
    return null
  }
  if (read.value < key.min || read.value > key.max) {
    const remedy =
      read.value <= 0 && key.min > 0
        ? 'the value must be above zero'
        : 'check the prefix and the power of ten'
    faults.push(faultAt(tree.place, 'number.out-of-range', tree.text, limitsText(key), remedy))
    return null
  }
  return read.value
}

const limitsText = (key: Limits): string =>
  `${formatQuantity(key.min, key.unit, key.shown)} to ${formatQuantity(key.max, key.unit, key.shown)}`

const exampleText = (key: Limits): string =>
  key.unit === '1' ? 'a number' : `a number with a unit such as ${key.shown ?? key.unit}`

function unitFault(fault: QuantityFault, key: Limits, tree: ScalarTree, path: string) {
  const due = exampleText(key)
  switch (fault.why) {
    case 'not a number':
      return faultAt(tree.place, 'number.unreadable', tree.text, due, `write a number for \`${path}\``)
    case 'no unit':
      return faultAt(
        tree.place,
        'unit.missing',
        `the bare number ${tree.text}`,
        due,
        `add the unit: \`${tree.text} ${key.shown ?? key.unit}\` if that is what it counts`,
      )
    case 'unknown unit': {
      const likely = fault.likely.slice(0, 3).map((one) => `\`${one}\``)
      return faultAt(
        tree.place,
        'unit.unknown',
        `the unit \`${fault.found}\``,
        due,
        likely.length > 0
          ? `did you mean ${likely.join(' or ')}?`
          : fault.found.startsWith(',')
            ? 'write the decimal point as `.`'
            : 'use SI units with the usual prefixes',
      )
    }
    case 'wrong kind':
      return faultAt(
        tree.place,
        'unit.wrong-kind',
        `${tree.text}`,
        due,
        fault.hint ?? `give \`${path}\` in a unit of the kind of ${key.shown ?? key.unit}`,
      )
  }
}

/** `{low, typical, high}` as 5th, 50th and 95th percentile, or `{mean, sigma}`. */
function readUncertain(key: QuantityKey, tree: MapTree, path: string, reading: Reading): Read<number> | null {
  const names = [...tree.entries.keys()].sort().join()
  if (names !== 'high,low,typical' && names !== 'mean,sigma') {
    const found = `keys ${[...tree.entries.keys()].join(', ') || 'none'}`
    reading.faults.push(
      faultAt(
        tree.place,
        'uncertain.form',
        found,
        '{low, typical, high} or {mean, sigma}',
        'give all three, or both',
      ),
    )
    return null
  }
  const spread =
    names === 'mean,sigma' ? gaussian(key, tree, path, reading) : threeValues(key, tree, path, reading)
  if (spread === null) return null
  if (!(spread.low <= spread.typical && spread.typical <= spread.high)) {
    reading.faults.push(
      faultAt(
        tree.place,
        'uncertain.order',
        'values out of order',
        'low ≤ typical ≤ high',
        'put the smallest value under `low`',
      ),
    )
    return null
  }
  return { value: spread.typical, note: { spread } }
}

/** A number under a key of a mapping. */
export function readMember(
  key: Limits,
  tree: MapTree,
  name: string,
  path: string,
  reading: Reading,
): number | null {
  const { value } = tree.entries.get(name)!
  if (value.kind === 'scalar' && value.is !== 'null')
    return readNumber(key, value, `${path}.${name}`, reading)
  reading.faults.push(
    faultAt(
      value.place,
      'number.unreadable',
      value.kind === 'scalar' ? 'nothing' : `a ${value.kind}`,
      exampleText(key),
      `write a number for \`${path}.${name}\``,
    ),
  )
  return null
}

function threeValues(key: QuantityKey, tree: MapTree, path: string, reading: Reading): Spread | null {
  const [low, typical, high] = ['low', 'typical', 'high'].map((name) =>
    readMember(key, tree, name, path, reading),
  )
  if (low == null || typical == null || high == null) return null
  return { low, typical, high }
}

function gaussian(key: QuantityKey, tree: MapTree, path: string, reading: Reading): Spread | null {
  const mean = readMember(key, tree, 'mean', path, reading)
  // A spread of a temperature is a difference, for which an offset would be wrong: it is read in kelvin.
  const sigma = readMember(
    { unit: key.unit, min: 0, max: key.max - Math.min(0, key.min) },
    tree,
    'sigma',
    path,
    reading,
  )
  if (mean === null || sigma === null) return null
  const spread = { low: mean - Z95 * sigma, typical: mean, high: mean + Z95 * sigma }
  if (spread.low >= key.min && spread.high <= key.max) return spread
  reading.faults.push(
    faultAt(
      tree.place,
      'number.out-of-range',
      'a spread that leaves the limits',
      limitsText(key),
      'lower `sigma`, or give {low, typical, high}',
    ),
  )
  return null
}

/** `[low, high]`, the lower first. */
export function readRange(
  key: RangeKey,
  tree: Tree,
  path: string,
  reading: Reading,
): Read<readonly [number, number]> | null {
  if (tree.kind !== 'list' || tree.items.length !== 2 || tree.items.some(({ kind }) => kind !== 'scalar')) {
    const found =
      tree.kind === 'scalar' ? tree.text : tree.kind === 'list' ? `${tree.items.length} values` : 'a mapping'
    reading.faults.push(
      faultAt(
        tree.place,
        'range.form',
        found,
        `[low, high] with units such as ${key.shown ?? key.unit}`,
        `write two values for \`${path}\``,
      ),
    )
    return null
  }
  const [low, high] = tree.items.map((item) => readNumber(key, item as ScalarTree, path, reading))
  if (low == null || high == null) return null
  if (low <= high) return { value: [low, high] }
  reading.faults.push(
    faultAt(
      tree.place,
      'range.form',
      'the higher value first',
      'the lower value first',
      'swap the two values',
    ),
  )
  return null
}
