import { describe, expect, test } from 'vitest'
import type { Case } from '../../src/blocks/bench.ts'
import { largestRate, settingsAtRate } from '../../src/explore/largest-rate.ts'
import { askedOf } from '../../src/verdict/asked.ts'
import { caseMargin, worstOf } from '../../src/verdict/margins.ts'
import { casePoints } from '../../src/verdict/points.ts'
import { caseOf } from '../blocks/bench.ts'

const SEARCH = { from: 1e9, to: 2e12, margin: 1 }
const buffersOnly = { examine: ['clock_buffers'], demand: { route: 'derived' } }

const marginAt = (given: Case, rate: number): number | null => {
  const settings = settingsAtRate(given.settings, rate)
  return caseMargin({ ...given, settings }, askedOf(given), casePoints(settings, given.node))
}

describe('the largest data rate at which a case passes', () => {
  test('law: a clock buffer needs speed in proportion to the rate, so it reaches rate times margin', () => {
    const given = caseOf(28, buffersOnly)
    const worst = worstOf(given, askedOf(given), casePoints(given.settings, given.node))
    const speed = worst[0]!.outcome.derived!.margin!
    const found = largestRate(given, SEARCH)
    if (found.kind !== 'found') throw new Error(found.kind)
    expect(found.rate / (56e9 * speed)).toBeCloseTo(1, 6)
    expect(found.stoppedBy).toMatch(/^clock_buffers\./)
    expect(found.stretches).toHaveLength(1)
  })

  test('law: it passes just below and fails just above', () => {
    for (const margin of [1, 1.15]) {
      const given = caseOf(16, { ...buffersOnly, clock: { coupling: 'ac' } })
      const found = largestRate(given, { ...SEARCH, margin })
      if (found.kind !== 'found') throw new Error(found.kind)
      expect(marginAt(given, found.rate * 0.9999)!).toBeGreaterThanOrEqual(margin)
      expect(marginAt(given, found.rate * 1.0001)!).toBeLessThan(margin)
    }
  })

  test('says beyond when even the top of the interval passes, nowhere when nothing does', () => {
    const given = caseOf(28, buffersOnly)
    expect(largestRate(given, { ...SEARCH, to: 2e9 }).kind).toBe('beyond')
    const starved = caseOf(28, { ...buffersOnly, supply: { voltage: 0.4 } })
    expect(largestRate(starved, SEARCH)).toMatchObject({ kind: 'nowhere' })
  })

  test('an asked check that cannot be computed makes the answer unknown, never a rate', () => {
    const given = caseOf(28, { ...buffersOnly, supply: { use: 'io' } })
    expect(largestRate(given, SEARCH).kind).toBe('unknown')
    expect(
      largestRate(caseOf(28, { oscillator: { kind: 'LC', range: [1e10, 1.1e10] } }, 'clock'), SEARCH).kind,
    ).toBe('unknown')
  })

  test('the oscillator follows the rate', () => {
    const given = caseOf(28, { oscillator: { kind: 'LC', range: [13e9, 15e9] } })
    expect(settingsAtRate(given.settings, 112e9).oscillator?.range).toEqual([26e9, 30e9])
  })
})
