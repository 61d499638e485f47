import type { Verdict } from './result.ts'

/** Verdict of one check: pass from 1 + guard, tight from 1, fail below; unknown without a margin. */
export function verdictOf(margin: number | null, guard: number): Verdict {
  if (margin === null || !Number.isFinite(margin)) return 'unknown'
  if (margin < 1) return 'fail'
  return margin < 1 + guard ? 'tight' : 'pass'
}

/** What a verdict and a margin are judged from. */
export interface Judged {
  readonly id: string
  readonly verdict: Verdict
  readonly margin: number | null
  readonly advisory?: boolean
}

/** Verdict of a case: fail if any check fails, else unknown if any is unknown, else tight, else pass. */
export function caseVerdict(checks: readonly Judged[]): Verdict {
  const counted = checks.filter((check) => check.advisory !== true)
  const any = (verdict: Verdict): boolean => counted.some((check) => check.verdict === verdict)
  if (counted.length === 0) return 'unknown'
  if (any('fail')) return 'fail'
  if (any('unknown')) return 'unknown'
  return any('tight') ? 'tight' : 'pass'
}

/** The check with the smallest known margin, the one that limits the case. */
export function limitingCheck<C extends Judged>(checks: readonly C[]): C | null {
  let worst: C | null = null
  for (const check of checks) {
    if (check.margin === null || check.advisory === true) continue
    if (worst === null || check.margin < worst.margin!) worst = check
  }
  return worst
}
