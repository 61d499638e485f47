import { formatLimits } from '../quantity/format.ts'
import type { Key, Keys } from './schema.ts'

/** One line of the key table in the guide. */
export interface KeyRow {
  readonly path: string
  /** What may stand there: kind of value, unit and limits in words. */
  readonly what: string
  readonly meaning: string
  readonly default: string
  readonly source: string
  readonly usedBy: string
}

/** The rows of a set of keys, made from their declaration; groups and sections come before their keys. */
export function keyTable(keys: Keys, under = ''): readonly KeyRow[] {
  return Object.entries(keys).flatMap(([name, key]) => {
    const path = under === '' ? name : `${under}.${name}`
    const own = row(path, key)
    return key.type === 'group' || key.type === 'section' ? [own, ...keyTable(key.keys, path)] : [own]
  })
}

function row(path: string, key: Key): KeyRow {
  return {
    path,
    what: whatOf(key),
    meaning: key.meaning,
    default: defaultOf(key),
    source: key.source ?? '',
    usedBy: (key.usedBy ?? []).join(', '),
  }
}

function whatOf(key: Key): string {
  switch (key.type) {
    case 'quantity':
      return `${unitWords(key)}, ${limits(key)}${key.uncertain === false ? '' : '; may be uncertain'}`
    case 'range':
      return `[low, high] in ${key.shown ?? key.unit}, ${limits(key)}`
    case 'count':
      return `whole number, ${key.min} to ${key.max}`
    case 'choice':
      return key.among.join(' | ')
    case 'text':
      return key.pattern === undefined ? 'text' : key.pattern.say
    case 'list':
      return key.among === undefined ? 'list of texts' : `list of: ${key.among.join(', ')}`
    case 'table':
      return 'numbers by name'
    case 'rows':
      return `rows of [${key.columns.map(({ name, unit }) => `${name} with its unit (${unit})`).join(', ')}]`
    case 'group':
      return 'group of keys'
    case 'section':
      return 'group of keys, absent unless written'
  }
}

const unitWords = ({ unit, shown }: { readonly unit: string; readonly shown?: string }): string =>
  unit === '1'
    ? shown === undefined
      ? 'number'
      : `number or ${shown}`
    : `quantity such as in ${shown ?? unit}`

const limits = (key: {
  readonly min: number
  readonly max: number
  readonly unit: string
  readonly shown?: string
}): string => formatLimits(key.min, key.max, key.unit, key.shown)

function defaultOf(key: Key): string {
  if (!('default' in key) || key.default === undefined) {
    return 'required' in key && key.required === true ? 'required' : ''
  }
  return Array.isArray(key.default) ? `[${key.default.join(', ')}]` : String(key.default)
}
