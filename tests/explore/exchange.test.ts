import { describe, expect, test } from 'vitest'
import { exchangeStudy } from '../../src/explore/exchange.ts'
import { stackedStageSpeed } from '../../src/explore/stacked-stage.ts'
import type { NodeValues } from '../../src/nodes/keys.ts'
import { builtInClass } from '../nodes/built-in.ts'

const [F16, F5, S3] = ['F16', 'F5', 'S3'].map((id) => builtInClass(id).values) as [
  NodeValues,
  NodeValues,
  NodeValues,
]

describe('stacked stages at core supply', () => {
  // Common practice, method section 1: 16 nm-class fins ahead of 5 nm and below.
  test('16 nm fins are ahead of 5 nm fins and of 3 nm sheets at the worst corner', () => {
    expect(stackedStageSpeed(F16)!).toBeGreaterThan(1.1 * stackedStageSpeed(F5)!)
    expect(stackedStageSpeed(F16)!).toBeGreaterThan(1.1 * stackedStageSpeed(S3)!)
  })

  test('and it is the core supply alone that decides: no other exchange reverses the order', () => {
    const { rows } = exchangeStudy(F16, F5, stackedStageSpeed)
    expect(rows.filter(({ reverses }) => reverses).map(({ path }) => path)).toEqual(['supply.core'])
  })
})

describe('exchange of values (law)', () => {
  const bySupply = (node: NodeValues): number => node.supply.core * 1e9

  test('only the value that the speed depends on reverses the order, and comes first', () => {
    const { speedA, speedB, rows } = exchangeStudy(F16, F5, bySupply)
    expect([speedA, speedB]).toEqual([bySupply(F16), bySupply(F5)])
    expect(rows[0]!.path).toBe('supply.core')
    expect(rows.filter(({ reverses }) => reverses)).toHaveLength(1)
  })

  test('exchanging twice gives the nodes back: the study of the exchanged pair mirrors the first', () => {
    const swapped = exchangeStudy(F5, F16, stackedStageSpeed)
    for (const row of exchangeStudy(F16, F5, stackedStageSpeed).rows) {
      const mirror = swapped.rows.find(({ path }) => path === row.path)!
      expect([mirror.speedA, mirror.speedB]).toEqual([row.speedB, row.speedA])
      expect([mirror.valueA, mirror.valueB]).toEqual([row.valueB, row.valueA])
      expect(mirror.reverses).toBe(row.reverses)
    }
  })

  test('a node against itself: nothing to reverse', () => {
    expect(exchangeStudy(F16, F16, bySupply).rows.some(({ reverses }) => reverses)).toBe(false)
  })

  test('no operating point counts as slower than any speed', () => {
    const blocked = (node: NodeValues): number | null => (node.supply.core > 0.75 ? 1 : null)
    const row = exchangeStudy(F16, F5, blocked).rows[0]!
    expect([row.path, row.speedA, row.speedB, row.reverses]).toEqual(['supply.core', null, 1, true])
  })
})
