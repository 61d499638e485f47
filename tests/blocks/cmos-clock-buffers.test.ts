import { describe, expect, it } from 'vitest'
import { cmosClockBuffers } from '../../src/blocks/cmos-clock-buffers.ts'
import { caseOf, nodeOf, type Overrides, outcomeOf, resultsOf, walkAll, worstMargin } from './bench.ts'

const cmos = (over: Overrides = {}): Overrides => ({ clock: { style: 'CMOS', ...over } })
const DATUM = { corner: 'typical', T: 300, c_mu: 1, dV_T: 0, dV_age: 0, tol_V: 0 } as const

describe('full-swing clock buffers', () => {
  it('law: at the datum the shortest period is six published fan-out-of-four delays', () => {
    const node = nodeOf(28)
    const found = outcomeOf(caseOf(node, cmos()), cmosClockBuffers, 'period', DATUM)
    expect(found.required! / (6 * node.fo4)).toBeCloseTo(1, 9)
    expect(found.available).toBeCloseTo(1 / 14e9, 15)
    expect(found.margin! * 6 * node.fo4 * 14e9).toBeCloseTo(1, 9)
  })

  it('law: a faster clock, a lower supply or a stricter multiple lowers the margin', () => {
    const margin = (over: Overrides) => worstMargin(caseOf(28, over), cmosClockBuffers, 'period')
    expect(margin({ ...cmos(), data_rate: 112e9 })).toBeCloseTo(margin(cmos()) / 2, 9)
    expect(margin({ ...cmos(), supply: { core_voltage: 0.8 } })).toBeLessThan(margin(cmos()))
    expect(margin(cmos({ cmos_period: 8 }))).toBeCloseTo((margin(cmos()) * 6) / 8, 9)
  })

  it('law: the worst corner is slower than the typical one', () => {
    const given = caseOf(16, cmos())
    expect(worstMargin(given, cmosClockBuffers, 'period')).toBeLessThan(
      outcomeOf(given, cmosClockBuffers, 'period', DATUM).margin!,
    )
  })

  // limits.json L30: CMOS-logic clocking ends near 17 GHz at 65 nm and 7 GHz at 180 nm.
  it('published: no clear pass beyond what CMOS logic has been clocked at', () => {
    const margin = (nm: 65 | 180, f: number) =>
      outcomeOf(caseOf(nm, { ...cmos(), data_rate: 4 * f }), cmosClockBuffers, 'period', DATUM).margin!
    expect(margin(65, 17e9)).toBeLessThan(1.15)
    expect(margin(180, 7e9)).toBeLessThan(1.15)
  })

  it('is asked when the clock is full-swing, in links and clock generators', () => {
    expect(cmosClockBuffers.asked(caseOf(28, cmos())).yes).toBe(true)
    expect(cmosClockBuffers.asked(caseOf(28)).yes).toBe(false)
    expect(cmosClockBuffers.of).toEqual(['link', 'clock'])
  })

  it('reports the delay it used', () => {
    expect(
      resultsOf(caseOf(28, cmos()), cmosClockBuffers, DATUM)['cmos_clock_buffers.fo4_s']!.value,
    ).toBeCloseTo(12e-12, 18)
  })

  it.each([16, 180] as const)('evaluates with mathjs at %i nm', (nm) => {
    expect(walkAll(caseOf(nm, cmos()), cmosClockBuffers)).toBeGreaterThan(50)
  })
})
