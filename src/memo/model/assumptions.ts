import type { Assumption, Result } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'
import { type QuantityText, valueText } from '../text/quantity.ts'
import type { AssumptionGroup, AssumptionRow } from './memo-model.ts'

/** Every value used, scenario first, then option by option, node by node. */
export function assumptionGroups(result: Result, write: QuantityText): readonly AssumptionGroup[] {
  const groups = new Map<string, AssumptionRow[]>()
  for (const assumption of result.assumptions) {
    const title = groupTitle(assumption.path)
    const rows = groups.get(title) ?? []
    rows.push(assumptionRow(assumption, write))
    groups.set(title, rows)
  }
  return [...groups].map(([title, rows]) => ({ title, rows }))
}

/** How many values were used and how many of them nobody stated or measured. */
export function assumptionCount({ assumptions }: Result): string {
  const count = (test: (given: Assumption) => boolean): number => assumptions.filter(test).length
  const defaults = count(({ origin }) => origin === 'default')
  const estimates = count(({ evidence }) => evidence === 'estimate')
  const invented = count(({ evidence }) => evidence === 'invented')
  return `${assumptions.length} values were used: ${defaults} are defaults that the scenario did not state, ${estimates} are estimates, ${invented} are invented.`
}

function groupTitle(path: string): string {
  const [head, name] = path.split('.')
  if (head === 'options' && name !== undefined) return `Option ${clean(name)}`
  if (head === 'nodes' && name !== undefined) return `Node ${clean(name)}`
  return 'Scenario'
}

function assumptionRow(given: Assumption, write: QuantityText): AssumptionRow {
  return {
    path: clean(given.path),
    value: assumedText(given, write),
    spread: spreadText(given, write),
    source: clean(given.source),
    evidence: clean(given.evidence),
    origin: given.origin,
    marks: marksOf(given),
  }
}

/** The value of an assumption in its own unit. */
export function assumedText({ value, unit, shown }: Assumption, write: QuantityText): string {
  if (value === null) return 'not stated'
  if (typeof value === 'string') return clean(value)
  if (typeof value === 'number') return valueText(value, unit, write, shown)
  const [first] = value
  if (typeof first === 'object') return rowsText(value as readonly (readonly number[])[], write)
  return (value as readonly (number | string)[])
    .map((one) => (typeof one === 'number' ? valueText(one, unit, write, shown) : clean(one)))
    .join(', ')
}

/** A measured profile by its length and its ends: the rows themselves are in the scenario. */
function rowsText(rows: readonly (readonly number[])[], write: QuantityText): string {
  const [least, most] = [rows[0]![0]!, rows.at(-1)![0]!]
  return `${rows.length} rows from ${write(least, 'Hz')} to ${write(most, 'Hz')}`
}

function spreadText({ low, high, unit, shown }: Assumption, write: QuantityText): string {
  if (low === undefined || high === undefined) return ''
  return `${valueText(low, unit, write, shown)} … ${valueText(high, unit, write, shown)}`
}

/** What sets an assumption apart: nobody stated it, or nobody measured it. */
export function marksOf({ origin, evidence }: Assumption): string {
  const marks = [
    origin === 'default' ? 'default' : '',
    evidence === 'estimate' || evidence === 'invented' ? evidence : '',
  ]
  return marks.filter((mark) => mark !== '').join(', ')
}
