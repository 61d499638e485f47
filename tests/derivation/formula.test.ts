import { evaluate } from 'mathjs'
import { describe, expect, test } from 'vitest'
import { formula, textOf } from '../../src/derivation/formula.ts'

const about = { symbol: 'y', meaning: 'a test value', unit: '1', source: 'this test' }

describe('a formula tells its own text', () => {
  test('powers, roots, natural logarithm and π in the notation of mathjs', () => {
    const text = textOf((a: number, b: number) => Math.sqrt(a ** 2 + b) / (2 * Math.PI) + Math.log(a))
    expect(text.parameters).toEqual(['a', 'b'])
    expect(text.expression).toBe('sqrt(a ^ 2 + b) / (2 * pi) + log(a)')
  })

  test('independent: mathjs evaluates the text to the value the function gives', () => {
    const one = formula(about, (IC: number, lambda: number) =>
      Math.max((lambda * IC) / 2, Math.exp(-4) * IC, IC > 3 ? lambda ** -0.5 : 1 - lambda),
    )
    for (const [IC, lambda] of [
      [0.1, 0.4],
      [7, 0.2],
      [40, 3],
    ] as const) {
      const shown = evaluate(one.text.expression, { IC, lambda }) as number
      expect(Math.abs(shown / one.run(IC, lambda) - 1)).toBeLessThan(1e-12)
    }
  })

  test('a function with statements is refused: its text could not be shown', () => {
    expect(() =>
      textOf((a: number) => {
        const b = a * 2
        return b
      }),
    ).toThrow(/single-expression/)
  })

  test('comments inside an expression do not reach the reader', () => {
    expect(textOf((a: number) => /* why */ a * 2).expression).toBe('a * 2')
  })
})
