/**
 * The vocabulary in which the keys of scenario and node files are declared. One declaration of a key serves
 * the reader, the checked type, the key table of the guide and the JSON Schema.
 */

/** What every key says about itself. */
export interface KeyAbout {
  readonly meaning: string
  /** Symbol in formulas and derivations, where the key has one. */
  readonly symbol?: string
  /** Where the default comes from; compulsory when there is a default. */
  readonly source?: string
  /** Ids of the sub-blocks or topics whose checks use the key. */
  readonly usedBy?: readonly string[]
}

export interface QuantityKey extends KeyAbout {
  readonly type: 'quantity'
  /** SI unit in which the value is held, `1` when dimensionless. Reading accepts any unit of the same kind. */
  readonly unit: string
  /** Unit for display, such as `GHz`. */
  readonly shown?: string
  /** Physical limits in SI; outside is refused. */
  readonly min: number
  readonly max: number
  /** Zero and below are refused unless `min` admits them. */
  readonly default?: string
  readonly required?: boolean
  /** The key that takes the value when it is written in unit intervals. */
  readonly inUI?: string
  /** May be written as `{low, typical, high}` or `{mean, sigma}`. Default true. */
  readonly uncertain?: boolean
}

export interface RangeKey extends KeyAbout {
  readonly type: 'range'
  readonly unit: string
  readonly shown?: string
  readonly min: number
  readonly max: number
  readonly default?: readonly [string, string]
  readonly required?: boolean
}

export interface CountKey extends KeyAbout {
  readonly type: 'count'
  readonly min: number
  readonly max: number
  readonly default?: number
  readonly required?: boolean
}

export interface ChoiceKey<T extends string> extends KeyAbout {
  readonly type: 'choice'
  readonly among: readonly T[]
  readonly default?: T
  readonly required?: boolean
}

export interface TextKey extends KeyAbout {
  readonly type: 'text'
  readonly longest: number
  /** Regular expression the text must match, with what to say when it does not. */
  readonly pattern?: { readonly is: RegExp; readonly say: string }
  readonly default?: string
  readonly required?: boolean
}

/** A list of plain texts, such as node ids, or of choices when `among` is given. */
export interface ListKey extends KeyAbout {
  readonly type: 'list'
  readonly among?: readonly string[]
  readonly longest: number
  readonly required?: boolean
}

/** A table of numbers by free name, such as a cost index by node id. */
export interface TableKey extends KeyAbout {
  readonly type: 'table'
  readonly unit: string
  readonly min: number
  readonly max: number
}

/** Rows of numbers, such as a phase-noise profile: one unit a column. */
export interface RowsKey extends KeyAbout {
  readonly type: 'rows'
  readonly columns: readonly {
    readonly name: string
    readonly unit: string
    readonly min: number
    readonly max: number
  }[]
  readonly longest: number
  /** Whether the first column must rise from row to row. */
  readonly rising?: boolean
}

/** A group of keys that always exists: what is not written takes its defaults. */
export interface GroupKey<G extends Keys> extends KeyAbout {
  readonly type: 'group'
  readonly keys: G
}

/** A group that is absent (null) unless the file writes it: writing it is asking for what it describes. */
export interface SectionKey<G extends Keys> extends KeyAbout {
  readonly type: 'section'
  readonly keys: G
}

export type Key =
  | QuantityKey
  | RangeKey
  | CountKey
  | ChoiceKey<string>
  | TextKey
  | ListKey
  | TableKey
  | RowsKey
  | GroupKey<Keys>
  | SectionKey<Keys>
export interface Keys {
  readonly [name: string]: Key
}

type Held<K, T> = K extends { readonly required: true } | { readonly default: unknown } ? T : T | null

/** The checked value of a key or a set of keys, in SI. */
export type Checked<K> = K extends QuantityKey
  ? Held<K, number>
  : K extends RangeKey
    ? Held<K, readonly [number, number]>
    : K extends CountKey
      ? Held<K, number>
      : K extends ChoiceKey<infer T>
        ? Held<K, T>
        : K extends TextKey
          ? Held<K, string>
          : K extends ListKey
            ? readonly string[] | null
            : K extends TableKey
              ? Readonly<Record<string, number>>
              : K extends RowsKey
                ? readonly (readonly number[])[] | null
                : K extends GroupKey<infer G>
                  ? CheckedKeys<G>
                  : K extends SectionKey<infer G>
                    ? CheckedKeys<G> | null
                    : never
export type CheckedKeys<G> = { readonly [P in keyof G]: Checked<G[P]> }

export const quantity = <const S extends Omit<QuantityKey, 'type'>>(
  spec: S,
): S & { readonly type: 'quantity' } => ({
  ...spec,
  type: 'quantity',
})
export const range = <const S extends Omit<RangeKey, 'type'>>(spec: S): S & { readonly type: 'range' } => ({
  ...spec,
  type: 'range',
})
export const count = <const S extends Omit<CountKey, 'type'>>(spec: S): S & { readonly type: 'count' } => ({
  ...spec,
  type: 'count',
})
export const choice = <const T extends string, const S extends Omit<ChoiceKey<T>, 'type' | 'among'>>(
  among: readonly T[],
  spec: S,
): S & { readonly type: 'choice'; readonly among: readonly T[] } => ({ ...spec, among, type: 'choice' })
export const text = <const S extends Omit<TextKey, 'type'>>(spec: S): S & { readonly type: 'text' } => ({
  ...spec,
  type: 'text',
})
export const list = (spec: Omit<ListKey, 'type'>): ListKey => ({ ...spec, type: 'list' })
export const table = (spec: Omit<TableKey, 'type'>): TableKey => ({ ...spec, type: 'table' })
export const rows = (spec: Omit<RowsKey, 'type'>): RowsKey => ({ ...spec, type: 'rows' })
export const group = <G extends Keys>(meaning: string, keys: G): GroupKey<G> => ({
  type: 'group',
  meaning,
  keys,
})
export const section = <G extends Keys>(meaning: string, keys: G): SectionKey<G> => ({
  type: 'section',
  meaning,
  keys,
})
