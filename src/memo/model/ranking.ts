import type { CaseResult, CheckResult } from '../../verdict/result.ts'

/** The checks that move the verdict, smallest known margin first, the limiting one at the head. */
export function byMargin(given: CaseResult): readonly CheckResult[] {
  const known = given.checks.filter((check) => check.margin !== null && check.advisory !== true)
  const place = (check: CheckResult): number => (check.id === given.limitedBy ? -1 : 0)
  return [...known].sort((a, b) => place(a) - place(b) || a.margin! - b.margin!)
}

/** The limiting check, or undefined when none is known. */
export function limitingCheck(given: CaseResult): CheckResult | undefined {
  return given.checks.find(({ id }) => id === given.limitedBy)
}
