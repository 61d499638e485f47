import { describe, expect, it } from 'vitest'
import { coreRunsHigh } from '../../src/blocks/core-stress.ts'
import { driver } from '../../src/blocks/driver.ts'
import { equaliser } from '../../src/blocks/equaliser.ts'
import { caseOf, outcomeOf, pointsOf, walked } from './bench.ts'

// The 16 nm test node: core 0.80 V, device limit 0.88 V.
const SERIES = { transmitter: { kind: 'source-series', swing: 0.5 } }
const INVERTERS = { receiver: { equaliser: 'complementary' } }
const lifted = (core_voltage: number) => ({ supply: { core_voltage } })
const BOTH = [
  ['source-series driver', driver, SERIES],
  ['complementary equaliser', equaliser, INVERTERS],
] as const

describe('a core supply above what its devices stand', () => {
  it("law: a node's own core supply with its tolerance is never one", () => {
    for (const nm of [180, 65, 28, 16, 5] as const) expect(coreRunsHigh(caseOf(nm))).toBe(false)
    // 0.84 V with 5 % tolerance is 0.882 V.
    expect(coreRunsHigh(caseOf(16, lifted(0.83)))).toBe(false)
    expect(coreRunsHigh(caseOf(16, lifted(0.84)))).toBe(true)
  })

  it.each(BOTH)('asks %s for stress only then', (_, block, style) => {
    const { asked } = block.checks.find(({ name }) => name === 'stress')!
    expect(asked!(caseOf(16, style))).toBe(false)
    expect(asked!(caseOf(16, { ...style, ...lifted(1) }))).toBe(true)
  })

  it.each(BOTH)('law: %s fails by limit over the highest supply', (_, block, style) => {
    const given = caseOf(16, { ...style, ...lifted(1) })
    const points = pointsOf(given)
    expect(outcomeOf(given, block, 'stress').margin).toBeCloseTo(0.88 / 1, 12)
    expect(outcomeOf(given, block, 'stress', points[1]).margin).toBeCloseTo(0.88 / 1.05, 12)
    for (const at of points) expect(walked(given, block, 'stress', at).length).toBeGreaterThan(2)
  })
})
