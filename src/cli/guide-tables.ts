import { type Limit, PRESET_TABLE, type Preset } from '../clocking/budget/presets.ts'
import { exchangeStudy } from '../explore/exchange.ts'
import { stackedStageSpeed } from '../explore/stacked-stage.ts'
import { nodeKeys } from '../nodes/keys.ts'
import { FAULT_CODES } from '../scenario/fault-codes.ts'
import { type KeyRow, keyTable } from '../scenario/key-table.ts'
import { optionKeys, scenarioKeys } from '../scenario/keys/index.ts'
import { optionHeadKeys } from '../scenario/option-keys.ts'
import { group } from '../scenario/schema.ts'
import { PARTS } from '../verdict/parts.ts'
import { ARGUMENT_CODES } from './argument-codes.ts'
import type { Io } from './io.ts'
import { builtInNodes } from './nodes.ts'
import { shownValue } from './shown.ts'

/** The tables of the guide, made from the declarations that the tool itself works with. */
export interface GuideTables {
  readonly scenarioKeys: readonly KeyRow[]
  readonly nodeKeys: readonly KeyRow[]
  readonly faultCodes: readonly { readonly code: string; readonly meaning: string }[]
  readonly nodeClasses: readonly Readonly<Record<string, string | number>>[]
  readonly subBlocks: readonly Readonly<Record<string, string>>[]
  /** Jitter allowances of open interface standards. */
  readonly presets: readonly Readonly<Record<string, string>>[]
  /** How much of the order of two classes rests on which value. */
  readonly exchange: ReturnType<typeof exchangeTable>
}

/** Keys that stand only inside an option. */
const optionOnly = {
  'options[]': group(
    'One alternative: its own keys, and any key above that does not belong to the scenario itself.',
    optionHeadKeys,
  ),
}

/** Gathers the tables: keys, codes of faults, node classes, sub-blocks. */
export function guideTables(io: Io): GuideTables {
  return {
    scenarioKeys: keyTable({ ...scenarioKeys, ...optionKeys, ...optionOnly }),
    nodeKeys: keyTable(nodeKeys),
    faultCodes: Object.entries({ ...FAULT_CODES, ...ARGUMENT_CODES }).map(([code, meaning]) => ({
      code,
      meaning,
    })),
    nodeClasses: builtInNodes(io).map(({ id, label, values }) => ({
      id,
      label,
      class_nm: Math.round(values.class * 1e10) / 10,
      kind: values.kind,
      core: shownValue(values.supply.core, 'V'),
      edition: values.edition ?? '',
    })),
    subBlocks: PARTS.map(({ id, title, of, checks }) => ({
      id,
      title,
      of: of.join(', '),
      checks: checks.map((check) => check.title).join('; '),
    })),
    presets: Object.entries(PRESET_TABLE).map(([id, preset]) => presetRow(id, preset)),
    exchange: exchangeTable(io, 'F16', 'F5'),
  }
}

/** A preset in words. */
function presetRow(id: string, preset: Preset): Readonly<Record<string, string>> {
  const { random, randomPeak, bounded, total, even_odd, rms, tail, error_ratio, tracking } = preset
  const named: readonly (readonly [string, Limit | undefined])[] = [
    ['random', random],
    [`random peak to peak at ${error_ratio}`, randomPeak],
    ['bounded', bounded],
    [`total at ${error_ratio}`, total],
    ['even-odd', even_odd],
    ['J_rms', rms],
    [`J_${tail?.n ?? ''}u`, tail],
  ]
  return {
    id,
    title: preset.title,
    clause: preset.clause,
    evidence: preset.evidence,
    tracking: tracking === null ? 'f_B/1667' : shownValue(tracking, 'Hz'),
    allowances: named
      .flatMap(([name, limit]) =>
        limit === undefined ? [] : [`${name} ${shownValue(limit.value, limit.unit)}`],
      )
      .join(', '),
  }
}

/** What a stacked stage gains or loses when two classes exchange one value at a time. */
function exchangeTable(io: Io, a: string, b: string) {
  const nodes = builtInNodes(io)
  const of = (id: string) => nodes.find((node) => node.id === id)!.values
  const { speedA, speedB, rows } = exchangeStudy(of(a), of(b), stackedStageSpeed)
  const speed = (value: number | null): string =>
    value === null ? 'no operating point' : shownValue(value, 'Hz')
  return {
    a,
    b,
    speedA: speed(speedA),
    speedB: speed(speedB),
    rows: rows.map((row) => ({
      path: row.path,
      meaning: row.meaning,
      valueA: shownValue(row.valueA, row.unit, row.shown),
      valueB: shownValue(row.valueB, row.unit, row.shown),
      speedA: speed(row.speedA),
      speedB: speed(row.speedB),
      reverses: row.reverses,
    })),
  }
}
