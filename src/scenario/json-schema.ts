import { optionKeys, scenarioKeys } from './keys/index.ts'
import { optionHeadKeys } from './option-keys.ts'
import type { Key, Keys, QuantityKey } from './schema.ts'

type Schema = Readonly<Record<string, unknown>>

const DRAFT = 'https://json-schema.org/draft/2020-12/schema'

/**
 * The JSON Schema (2020-12) of scenario or node files, made from the same declarations that reading uses. Units
 * and limits are checked by reading; the schema tells an editor keys, choices and forms.
 *
 * @param kind which file
 * @param nodeKeys declaration of node files, given from outside because nodes stand beside scenarios
 */
export function jsonSchema(kind: 'scenario' | 'node', nodeKeys: Keys): Schema {
  if (kind === 'node') return { $schema: DRAFT, title: 'Node file', ...objectOf(nodeKeys, 'node') }
  const top = objectOf({ ...scenarioKeys, ...optionKeys }, 'scenario')
  const needed = requiredIn(scenarioKeys)
  const option = objectOf({ ...optionHeadKeys, ...optionKeys }, 'scenario')
  const options = {
    type: 'array',
    items: { ...option, required: ['id'] },
    description: 'Alternatives: overrides of the keys above.',
  }
  return {
    $schema: DRAFT,
    title: 'Scenario',
    ...top,
    properties: { ...(top.properties as Schema), options },
    // What a scenario does not state may come from one that it includes.
    anyOf: [{ required: needed }, { required: ['include'] }],
  }
}

type Of = 'scenario' | 'node'

const requiredIn = (keys: Keys): readonly string[] =>
  Object.entries(keys)
    .filter(([, key]) => 'required' in key && key.required === true)
    .map(([name]) => name)

/** No key is required below the top: options, included files and `based_on` may complete what is begun here. */
function objectOf(keys: Keys, of: Of): Schema {
  return {
    type: 'object',
    properties: Object.fromEntries(
      Object.entries(keys).map(([name, key]) => [
        name,
        { description: key.meaning, ...orNothing(schemaOf(key, of)) },
      ]),
    ),
    additionalProperties: false,
  }
}

/** Any key may be blanked, which takes back what an included file or the scenario above an option wrote. */
function orNothing(schema: Schema): Schema {
  if (Array.isArray(schema.enum)) return { ...schema, enum: [...schema.enum, null] }
  if (Array.isArray(schema.anyOf)) return { ...schema, anyOf: [...schema.anyOf, { type: 'null' }] }
  const types = [schema.type].flat()
  return types.includes('null') ? schema : { ...schema, type: [...types, 'null'] }
}

function schemaOf(key: Key, of: Of): Schema {
  switch (key.type) {
    case 'quantity':
      return quantitySchema(key, of)
    case 'range':
      return { type: 'array', items: single(key), minItems: 2, maxItems: 2 }
    case 'count':
      return { type: 'integer', minimum: key.min, maximum: key.max }
    case 'choice':
      return key.among.join() === 'yes,no' ? { enum: [...key.among, true, false] } : { enum: key.among }
    case 'text':
      return { type: ['string', 'number'], maxLength: key.longest }
    case 'list':
      return {
        type: ['array', 'string'],
        items: key.among === undefined ? { type: 'string' } : { enum: key.among },
        maxItems: key.longest,
      }
    case 'table':
      return { type: 'object', additionalProperties: { type: ['number', 'string'] } }
    case 'rows':
      return {
        type: 'array',
        items: { type: 'array', minItems: key.columns.length, maxItems: key.columns.length },
      }
    case 'group':
      return objectOf(key.keys, of)
    case 'section':
      return { ...objectOf(key.keys, of), type: ['object', 'null'] }
  }
}

/** A quantity with a unit is a text; one without may be a number. */
const single = ({ unit }: { readonly unit: string }): Schema =>
  unit === '1' ? { type: ['number', 'string'] } : { type: 'string' }

function quantitySchema(key: QuantityKey, of: Of): Schema {
  const value = single(key)
  if (key.uncertain === false) return value
  if (of === 'node') {
    const evidence = { enum: ['published', 'derived', 'common practice', 'estimate', 'invented', 'given'] }
    const properties = { value, source: { type: 'string' }, evidence, low: value, high: value }
    return { type: 'object', properties, required: ['value', 'source'], additionalProperties: false }
  }
  const three = {
    type: 'object',
    properties: { low: value, typical: value, high: value },
    required: ['low', 'typical', 'high'],
    additionalProperties: false,
  }
  const gaussian = {
    type: 'object',
    properties: { mean: value, sigma: value },
    required: ['mean', 'sigma'],
    additionalProperties: false,
  }
  return { anyOf: [value, three, gaussian] }
}
