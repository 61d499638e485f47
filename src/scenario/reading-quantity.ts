import { formatLimits } from '../quantity/format.ts'
import { parseQuantity, type QuantityFault } from '../quantity/parse-quantity.ts'
import type { Spread } from './checked.ts'
import { faultAt } from './fault.ts'
import type { Read, Reading } from './reading.ts'
import type { QuantityKey, RangeKey } from './schema.ts'
import { inWords, type MapTree, type ScalarTree, type Tree } from './tree.ts'

type Limits = Pick<QuantityKey, 'unit' | 'shown' | 'min' | 'max'>

/** Infinity and not-a-number as YAML, programs and people write them, with or without a unit. */
const NOT_FINITE = /^[-+]?\.?(?:nan|inf|infinity|∞)(?![a-z])/i

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
  if (NOT_FINITE.test(tree.text.trim())) {
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
    faults.push(
      faultAt(tree.place, 'number.out-of-range', tree.text, limitsText(key), outsideRemedy(key, read.value)),
    )
    return null
  }
  return read.value
}

function outsideRemedy({ unit, min, max }: Limits, value: number): string {
  if (value < 0 && -value >= min && -value <= max) return 'leave the minus sign out'
  if (value <= 0 && min > 0) return 'the value must be above zero'
  return unit === '1' ? 'check the value and its power of ten' : 'check the prefix and the power of ten'
}

const limitsText = (key: Limits): string => formatLimits(key.min, key.max, key.unit, key.shown)

const exampleText = (key: Limits): string =>
  key.unit === '1'
    ? `a number${key.shown === undefined ? '' : `, or one in ${key.shown}`}`
    : `a number with a unit such as ${key.shown ?? key.unit}`

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
        tree.text,
        due,
        fault.hint ??
          (key.unit === '1'
            ? `give \`${path}\` without a unit`
            : `give \`${path}\` in ${key.shown ?? key.unit} or a multiple of it`),
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
        membersText(tree, ['low', 'typical', 'high']),
        'low ≤ typical ≤ high',
        'put the smallest value under `low`',
      ),
    )
    return null
  }
  return { value: spread.typical, note: { spread } }
}

/** Members of a mapping as written, for a message. */
export const membersText = (tree: MapTree, names: readonly string[]): string =>
  names
    .filter((name) => tree.entries.has(name))
    .map((name) => `${name} ${inWords(tree.entries.get(name)!.value)}`)
    .join(', ')

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
      inWords(value),
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
  const sigma = readMember(
    { unit: sigmaUnit(key.unit, tree), min: 0, max: key.max - Math.min(0, key.min) },
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
      `${formatLimits(spread.low, spread.high, key.unit, key.shown)} as 5th and 95th percentile`,
      limitsText(key),
      'lower `sigma`, or give {low, typical, high}',
    ),
  )
  return null
}

/** The spread of a level such as −228 dBc/Hz is a ratio, in dB; people also write it in the unit of the level. */
function sigmaUnit(unit: string, tree: MapTree): string {
  const value = tree.entries.get('sigma')?.value
  return unit.startsWith('dB') && value?.kind === 'scalar' && /dB\s*$/.test(value.text) ? 'dB' : unit
}

/** `[low, high]`, the lower first. */
export function readRange(
  key: RangeKey,
  tree: Tree,
  path: string,
  reading: Reading,
): Read<readonly [number, number]> | null {
  if (tree.kind !== 'list' || tree.items.length !== 2 || tree.items.some(({ kind }) => kind !== 'scalar')) {
    const found = tree.kind === 'list' ? `${tree.items.length} values` : inWords(tree)
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
      `[${tree.items.map(inWords).join(', ')}]`,
      'the lower value first',
      'swap the two values',
    ),
  )
  return null
}
