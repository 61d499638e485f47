import { describe, expect, test } from 'vitest'
import { caseVerdict, limitingCheck, verdictOf } from '../../src/verdict/verdict.ts'

describe('verdict of a check (method section 0)', () => {
  test.each([
    [1.15, 'pass'],
    [1.1499999, 'tight'],
    [1, 'tight'],
    [0.9999999, 'fail'],
    [0, 'fail'],
    [null, 'unknown'],
    [Number.NaN, 'unknown'],
  ] as const)('law: margin %s with a guard of 15 %% is %s', (margin, verdict) => {
    expect(verdictOf(margin, 0.15)).toBe(verdict)
  })
})

const check = (verdict: 'pass' | 'tight' | 'fail' | 'unknown', margin: number | null, advisory = false) => ({
  id: `${verdict}-${margin}`,
  verdict,
  margin,
  advisory,
})

describe('verdict of a case', () => {
  test('law: fail beats unknown, unknown beats tight, tight beats pass', () => {
    const [pass, tight, fail, unknown] = [
      check('pass', 2),
      check('tight', 1.1),
      check('fail', 0.5),
      check('unknown', null),
    ]
    expect(caseVerdict([pass, tight, unknown, fail])).toBe('fail')
    expect(caseVerdict([pass, tight, unknown])).toBe('unknown')
    expect(caseVerdict([pass, tight])).toBe('tight')
    expect(caseVerdict([pass])).toBe('pass')
  })

  test('a case in which nothing was judged is unknown, never a pass', () => {
    expect(caseVerdict([])).toBe('unknown')
  })

  test('advisory checks do not move it and do not limit it', () => {
    const checks = [check('fail', 0.1, true), check('pass', 2)]
    expect(caseVerdict(checks)).toBe('pass')
    expect(limitingCheck(checks)?.id).toBe('pass-2')
  })

  test('the smallest known margin limits', () => {
    expect(limitingCheck([check('unknown', null), check('pass', 3), check('tight', 1.05)])?.margin).toBe(1.05)
    expect(limitingCheck([check('unknown', null)])).toBeNull()
  })
})
