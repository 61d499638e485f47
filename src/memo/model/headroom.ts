import type { CaseResult, CheckResult, NamedValue, Result } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'
import { marginText } from '../text/margin.ts'
import { type QuantityText, valueText } from '../text/quantity.ts'
import { bothValues } from './checks.ts'
import type { HeadroomGroup, HeadroomRow } from './memo-model.ts'

/** Supply available and needed of every stacked stage, and the device at its design point. */
export function headroomGroups(result: Result, write: QuantityText): readonly HeadroomGroup[] {
  return result.options
    .map(({ id, label }) => ({
      option: clean(label || id),
      rows: result.cases
        .filter(({ option }) => option === id)
        .flatMap((given) =>
          given.checks.filter(isHeadroom).map((check) => headroomRow(given, check, result.guard, write)),
        ),
    }))
    .filter(({ rows }) => rows.length > 0)
}

const isHeadroom = ({ id, unit }: CheckResult): boolean => unit === 'V' && /(^|\.)headroom$/.test(id)

function headroomRow(given: CaseResult, check: CheckResult, guard: number, write: QuantityText): HeadroomRow {
  const { available, required } = bothValues(check, write)
  return {
    node: clean(given.node),
    subBlock: clean(check.title.replace(/:\s*headroom$/i, '')),
    verdict: check.verdict,
    available,
    needed: required,
    spare: spareText(check, write),
    binding: clean([check.basis, ...reasons(check), ...starved(given, check)].join('; ')),
    design: DESIGN.map(([name, unit]) =>
      designValue(given.results[`device.${check.subBlock}.${name}`], name, unit, guard, write),
    ),
  }
}

/** Why no operating point was found; ends of uncertain inputs stand in the table of all checks. */
function reasons({ reason = '' }: CheckResult): readonly string[] {
  return reason.split('; ').filter((part) => part !== '' && !/^fails at the (low|high) end/.test(part))
}

/** Says when the device shown is not the one that the needed supply is for. */
function starved(given: CaseResult, { subBlock }: CheckResult): readonly string[] {
  const { reason } = given.results[`device.${subBlock}.fT_Hz`] ?? {}
  return reason !== undefined && /capability/.test(reason)
    ? ['device shown as fast as this supply allows']
    : []
}

/** Millivolts to spare or missing. */
function spareText({ required, available }: CheckResult, write: QuantityText): string {
  if (required === null || available === null) return '–'
  const spare = available - required
  return `${write(Math.abs(spare), 'V', 'mV', 3)} ${spare < 0 ? 'missing' : 'spare'}`
}

const DESIGN = [
  ['fT_Hz', 'Hz'],
  ['IC', '1'],
  ['J_A_per_m', 'A/m'],
  ['VGS_V', 'V'],
  ['VDSsat_V', 'V'],
  ['gmOverId_per_V', '1/V'],
  ['selfGain', '1'],
] as const

function designValue(
  found: NamedValue | undefined,
  name: string,
  unit: string,
  guard: number,
  write: QuantityText,
): string {
  if (found === undefined || found.value === null) return '–'
  if (name === 'IC' || name === 'selfGain') return marginText(found.value, guard)
  return valueText(found.value, unit, write)
}
