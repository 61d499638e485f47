import { describe, expect, it } from 'vitest'
import { parse } from 'yaml'
import { nodeKeys } from '../../src/nodes/keys.ts'
import type { Provenance } from '../../src/scenario/checked.ts'
import type { Fault } from '../../src/scenario/fault.ts'
import { jsonSchema } from '../../src/scenario/json-schema.ts'
import { keyTable } from '../../src/scenario/key-table.ts'
import { optionKeys, scenarioKeys } from '../../src/scenario/keys/index.ts'
import { readKeys } from '../../src/scenario/reading.ts'
import type { Key, Keys } from '../../src/scenario/schema.ts'
import { starters } from '../../src/scenario/starters.ts'
import { accessTo, demo, link } from './scenarios.ts'

interface Schema {
  readonly [word: string]: unknown
  readonly properties?: Readonly<Record<string, Schema>>
  readonly items?: Schema
  readonly anyOf?: readonly Schema[]
  readonly additionalProperties?: boolean | Schema
}

const typeOf = (value: unknown): string =>
  value === null ? 'null' : Array.isArray(value) ? 'array' : typeof value

/** The words of JSON Schema (2020-12) that the schemas use, as the standard defines them. */
function violations(schema: Schema, value: unknown, path = ''): readonly string[] {
  const known = [
    '$schema',
    'title',
    'description',
    'type',
    'properties',
    'required',
    'additionalProperties',
    'items',
    'anyOf',
    'enum',
    'minItems',
    'maxItems',
    'minimum',
    'maximum',
    'maxLength',
  ]
  const strange = Object.keys(schema).filter((word) => !known.includes(word))
  if (strange.length > 0) return [`${path}: the word ${strange.join()} is not tested`]
  const types = [schema.type ?? []].flat() as string[]
  const type = typeOf(value)
  const fits =
    types.length === 0 || types.includes(type) || (types.includes('integer') && Number.isInteger(value))
  const found: string[] = fits ? [] : [`${path}: ${type} instead of ${types.join()}`]
  if (Array.isArray(schema.enum) && !schema.enum.includes(value))
    found.push(`${path}: ${String(value)} not among ${schema.enum.join()}`)
  if (schema.anyOf?.every((one) => violations(one, value, path).length > 0)) found.push(`${path}: fits none`)
  if (typeof value === 'number') {
    if (value < ((schema.minimum as number) ?? -Infinity) || value > ((schema.maximum as number) ?? Infinity))
      found.push(`${path}: out of range`)
  }
  if (Array.isArray(value)) {
    if (
      value.length < ((schema.minItems as number) ?? 0) ||
      value.length > ((schema.maxItems as number) ?? Infinity)
    )
      found.push(`${path}: ${value.length} items`)
    if (schema.items !== undefined)
      found.push(...value.flatMap((item, k) => violations(schema.items!, item, `${path}[${k}]`)))
  }
  if (type === 'object') found.push(...ofObject(schema, value as Record<string, unknown>, path))
  return found
}

function ofObject(schema: Schema, value: Readonly<Record<string, unknown>>, path: string): readonly string[] {
  const missing = ((schema.required as string[]) ?? []).filter((name) => !Object.hasOwn(value, name))
  const inside = Object.entries(value).flatMap(([name, inner]) => {
    const own = schema.properties?.[name] ?? schema.additionalProperties
    if (own === undefined || own === true) return []
    return own === false ? [`${path}.${name}: not known`] : violations(own, inner, `${path}.${name}`)
  })
  return [...missing.map((name) => `${path}.${name}: missing`), ...inside]
}

describe('JSON Schema', () => {
  const scenario = jsonSchema('scenario', nodeKeys) as Schema
  const node = jsonSchema('node', nodeKeys) as Schema

  it.each([
    ...['lane-56', 'lane-224', 'low-cost-lane', 'clock-generator'].map(demo),
    ...Object.values(starters),
  ])('%#: what ships fits it', (text) => {
    expect(violations(scenario, parse(text))).toEqual([])
  })

  it.each(['P28', 'F16'])('the built-in class %s fits it', (id) => {
    expect(violations(node, parse(accessTo().builtIn(id)!))).toEqual([])
  })

  it.each([
    link({}, 'modulaton: PAM-2\n'),
    link({ modulation: 'PAM4' }),
    link({ data_rate: '56' }),
    link({ receiver: '{dfe_taps: 1.5}' }),
    link({ title: null }),
    link({ power_budget: '{low: 1 W, high: 2 W}' }),
    link({ oscillator: '{kind: LC, range: [1 GHz]}' }),
    link({ options: '[{label: A}]' }),
  ])('%#: an editor is told what reading would refuse', (text) => {
    expect(violations(scenario, parse(text))).not.toEqual([])
  })

  it('a node value without source is told', () => {
    expect(violations(node, { nmos: { L: { value: '30 nm' } } })).not.toEqual([])
    expect(violations(node, { nmos: { L: { value: '30 nm', source: 'us' } } })).toEqual([])
  })

  it('a section may be switched off, and what is included need not be repeated', () => {
    expect(violations(scenario, parse(link({ options: '[{id: a, oscillator: null}]' })))).toEqual([])
    expect(violations(scenario, { include: ['b.yaml'] })).toEqual([])
  })
})

const leaves = (keys: Keys, under = ''): readonly (readonly [string, Key])[] =>
  Object.entries(keys).flatMap(([name, key]) =>
    key.type === 'group' || key.type === 'section'
      ? leaves(key.keys, `${under}${name}.`)
      : [[`${under}${name}`, key] as const],
  )

describe('key table', () => {
  const all = { ...scenarioKeys, ...optionKeys }

  it('has one row a key, with its meaning, and the source of every default', () => {
    for (const keys of [all, nodeKeys]) {
      const rows = keyTable(keys)
      expect(new Set(rows.map(({ path }) => path)).size).toBe(rows.length)
      expect(leaves(keys).filter(([path]) => !rows.some((row) => row.path === path))).toEqual([])
      expect(rows.filter(({ meaning, what }) => meaning === '' || what === '')).toEqual([])
      expect(
        rows.filter((row) => row.default !== '' && row.default !== 'required' && row.source === ''),
      ).toEqual([])
      expect(rows.filter(({ what }) => /NaN|undefined|Infinity/.test(what))).toEqual([])
    }
  })

  it('names everything that the product asks of it', () => {
    const paths = keyTable(all).map(({ path }) => path)
    for (const path of [
      'process.corner',
      'process.temperature',
      'supply.tolerance',
      'supply.use',
      'pads.extension',
      'pads.cdm_current',
      'transmitter.swing',
      'transmitter.termination',
      'transmitter.ffe_taps',
      'transmitter.level_mismatch',
      'receiver.kind',
      'receiver.ctle.boost',
      'receiver.dfe_taps',
      'receiver.converter.resolution',
      'noise.figure',
      'channel.crosstalk',
      'fec.code',
      'oscillator.tank_q',
      'loop.bandwidth',
      'loop.tuning_gain',
      'clock.supply_ripple',
      'jitter_budget.preset',
      'demand.route',
      'demand.formulas.driver',
      'guard',
      'power_budget',
      'cost_index',
    ])
      expect(paths).toContain(path)
  })
})

it('law: every default lies inside its limits and is of its kind', () => {
  for (const keys of [optionKeys, nodeKeys]) {
    const faults: Fault[] = []
    const provenance: Provenance[] = []
    // Every section is asked for, so that the defaults inside are read as well.
    const asked = (inner: Keys): Keys =>
      Object.fromEntries(
        Object.entries(inner).map(([name, key]) => [
          name,
          key.type === 'group' || key.type === 'section'
            ? { ...key, type: 'group', keys: asked(key.keys) }
            : key,
        ]),
      )
    readKeys(asked(keys), null, '', { of: 'scenario', faults, provenance })
    const withDefault = leaves(keys).filter(([, key]) => 'default' in key && key.default !== undefined)
    expect(provenance.map(({ path }) => path).sort()).toEqual(withDefault.map(([path]) => path).sort())
    expect(provenance.filter(({ value }) => value === null)).toEqual([])
    for (const [path, key] of withDefault)
      if (key.type === 'choice') expect(key.among, path).toContain(key.default)
  }
})
