import type { Step } from '../derivation/recorder.ts'
import { clean } from '../memo/text/clean.ts'
import { marginText } from '../memo/text/margin.ts'
import type { CaseResult, CheckResult } from '../verdict/result.ts'
import { comparison, pointText } from './check-report.ts'
import type { Paint } from './paint.ts'
import { shownValue } from './shown.ts'
import { wrapped } from './wrapped.ts'

/** How a step came about: the formula that ran, the residual that vanishes, or the procedure. */
function origin({ kind, formula, tolerance }: Step): string {
  if (kind === 'leaf') return ''
  if (kind === 'formula') return ` = ${formula}`
  const closeness = tolerance === undefined ? '' : ` (${tolerance})`
  return kind === 'search' ? `, solves ${formula} = 0${closeness}` : `, ${formula}${closeness}`
}

function inputs({ inputs: given, from }: Step): string {
  return Object.entries(given)
    .map(
      ([name, value]) =>
        `${name} = ${Number(value.toPrecision(6))}${from[name] === undefined ? '' : ` [${from[name]}]`}`,
    )
    .join(', ')
}

function stepLines(step: Step, width: number): readonly string[] {
  const role = step.yields === undefined ? '' : ` (${step.yields})`
  const head = `${step.symbol}${origin(step)} = ${shownValue(step.value, step.unit)}${role}`
  const given = inputs(step)
  const place = step.path === undefined ? '' : ` (${step.path})`
  return [
    wrapped(clean(head), width, `  ${step.id.padEnd(4)} `, '         '),
    ...(given === '' ? [] : [wrapped(clean(given), width, '       ')]),
    wrapped(clean(`${step.meaning.replace(/\.$/, '')}; ${step.source}${place}`), width, '       '),
  ]
}

function checkLines(check: CheckResult, guard: number, width: number, paint: Paint): readonly string[] {
  const at = pointText(check)
  const margin = check.margin === null ? '' : `, margin ${marginText(check.margin, guard)}`
  return [
    '',
    `${check.id}  ${paint(check.verdict, check.verdict)}${margin}`,
    wrapped(clean(`${check.title}. ${comparison(check)}${at === '' ? '' : ` (${at})`}.`), width, '  '),
    wrapped(clean(`Governed by: ${check.basis}.`), width, '  '),
    ...(check.reason === undefined ? [] : [wrapped(clean(`Note: ${check.reason}.`), width, '  ')]),
    ...check.steps.flatMap((step) => stepLines(step, width)),
  ]
}

/**
 * What `why` prints: the verdict of the case, then the derivation of each check, step by step, each input with
 * the step it came from in brackets.
 */
export function whyReport(
  one: CaseResult,
  checks: readonly CheckResult[],
  guard: number,
  width: number,
  paint: Paint,
): string {
  const margin = one.margin === null ? '' : `, margin ${marginText(one.margin, guard)}`
  const limit = one.limitedBy === null ? '' : `, limited by ${one.limitedBy}`
  return [
    `${clean(one.option)} in ${clean(one.node)}: ${paint(one.verdict, one.verdict)}${margin}${limit}`,
    ...checks.flatMap((check) => checkLines(check, guard, width, paint)),
  ].join('\n')
}
