import type { CaseResult, Result } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'
import { whichCases } from './case-names.ts'
import type { NotExaminedRow, UnknownRow } from './memo-model.ts'

/** What nobody asked, each thing once with the cases it concerns. */
export function notExaminedRows(result: Result): readonly NotExaminedRow[] {
  const entries = result.cases.flatMap((given) =>
    given.notExamined.map(({ title, reason }) => ({ given, title, reason })),
  )
  return gathered(entries, result)
}

/** What was asked and could not be computed, each thing once with the cases it concerns. */
export function unknownRows(result: Result): readonly UnknownRow[] {
  const entries = result.cases.flatMap((given) =>
    given.checks
      .filter(({ verdict }) => verdict === 'unknown')
      .map(({ title, reason }) => ({ given, title, reason: reason ?? 'no reason recorded' })),
  )
  return gathered(entries, result)
}

function gathered(
  entries: readonly { readonly given: CaseResult; readonly title: string; readonly reason: string }[],
  result: Result,
): readonly { readonly title: string; readonly reason: string; readonly cases: string }[] {
  const groups = new Map<string, { title: string; reason: string; cases: CaseResult[] }>()
  for (const { given, title, reason } of entries) {
    const key = JSON.stringify([title, reason])
    const group = groups.get(key) ?? { title: clean(title), reason: clean(reason), cases: [] }
    group.cases.push(given)
    groups.set(key, group)
  }
  return [...groups.values()].map(({ title, reason, cases }) => ({
    title,
    reason,
    cases: whichCases(cases, result),
  }))
}
