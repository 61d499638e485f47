import type { CaseResult, CheckResult, Result } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'
import { marginText } from '../text/margin.ts'
import type { QuantityText } from '../text/quantity.ts'
import { anchor } from './anchor.ts'
import { caseName } from './case-names.ts'
import { bothValues, pointText } from './checks.ts'
import type { GridRow, LimitRow } from './memo-model.ts'
import { byMargin, limitingCheck } from './ranking.ts'
import { optionLine } from './title-block.ts'

/** Options down, nodes across; a case that was not evaluated is unknown. */
export function gridRows(result: Result, write: QuantityText): readonly GridRow[] {
  return result.options.map((option) => ({
    option: clean(option.label || option.id),
    about: optionLine(option, write),
    cells: result.nodes.map(({ id }) => {
      const found = result.cases.find((given) => given.option === option.id && given.node === id)
      return {
        anchor: anchor('case', option.id, id),
        name: caseName({ option: option.id, node: id }),
        verdict: found?.verdict ?? 'unknown',
        margin: marginText(found?.margin ?? null, result.guard),
        limit: clean((found && limitingCheck(found)?.title) ?? ''),
      }
    }),
  }))
}

/** Required with its sense, so that a ceiling reads as one; a yes or no in words. */
function comparedValues(
  check: CheckResult,
  write: QuantityText,
): { readonly required: string; readonly available: string } {
  if (check.yesNo === true) return { required: 'yes', available: check.verdict === 'fail' ? 'no' : 'yes' }
  const { required, available } = bothValues(check, write)
  const sign = check.sense === 'at most' ? '≤' : '≥'
  return { required: check.required === null ? required : `${sign} ${required}`, available }
}

/** What limits a case, at which operating point, and what would limit it next. */
export function limitRow(given: CaseResult, guard: number, write: QuantityText): LimitRow {
  const check = limitingCheck(given)
  const next = byMargin(given).find(
    ({ id, yesNo, verdict }) => id !== given.limitedBy && !(yesNo === true && verdict === 'pass'),
  )
  const unknowns = given.checks.filter(
    ({ verdict, advisory }) => verdict === 'unknown' && advisory !== true,
  ).length
  const values = check === undefined ? { required: '–', available: '–' } : comparedValues(check, write)
  return {
    anchor: anchor('case', given.option, given.node),
    option: clean(given.option),
    node: clean(given.node),
    verdict: given.verdict,
    title: clean(check?.title ?? 'no margin is known'),
    ...values,
    margin: marginText(check?.margin ?? null, guard),
    at: pointText(check?.operatingPoint ?? null, write),
    next: next === undefined ? '–' : `${clean(next.title)} (${marginText(next.margin, guard)})`,
    note: [
      given.verdict === 'unknown' ? `not judged: ${unknowns} of ${given.checks.length} checks unknown` : '',
      check?.yesNo === true && check.verdict === 'fail' ? clean(check.reason ?? '') : '',
    ]
      .filter((text) => text !== '')
      .join('; '),
  }
}
