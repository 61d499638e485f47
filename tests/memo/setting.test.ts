import { describe, expect, it } from 'vitest'
import { extent, linesOf, piece } from '../../src/memo/pdf/lines.ts'
import { setFormula } from '../../src/memo/text/formula.ts'
import { marginText } from '../../src/memo/text/margin.ts'
import { setNumber } from '../../src/memo/text/number.ts'
import { plain } from '../../src/memo/text/runs.ts'

const style = { font: 'sans', size: 10, colour: '#000000' } as const
/** Every letter half as wide as the type is high. */
const measure = (text: string, _font: string, size: number): number => [...text].length * size * 0.5

describe('lines', () => {
  const text = 'a capacitance of_a_very_long_name/that_nobody.breaks 0123456789012345678901234567890 end'

  it.each([12, 30, 57, 100, 500])('law: no line is wider than %d points and nothing is lost', (width) => {
    const lines = linesOf([piece(text, style)], width, measure)
    for (const line of lines) expect(line.width).toBeLessThanOrEqual(width + 0.01)
    const drawn = lines.map(({ pieces }) => pieces.map((one) => one.text).join('')).join('')
    expect(drawn.replace(/ /g, '')).toBe(text.replace(/ /g, ''))
  })

  it('keep the blank at the start of a piece that follows another', () => {
    const [line] = linesOf([piece('f', style), piece(' = g', style)], 500, measure)
    expect(line!.pieces.map((one) => one.text).join('')).toBe('f = g')
    expect(extent([piece('f', style), piece(' = g', style)], measure).most).toBe(25)
  })
})

describe('numbers and formulas', () => {
  it.each([
    [0.9996, '0.9996'],
    [1.1499, '1.1499'],
    [1.15, '1.15'],
    [1.002, '1.00'],
    [0.994, '0.99'],
    [null, '–'],
  ])('law: the margin %s is not rounded across break-even or guard: %s', (margin, shown) => {
    expect(marginText(margin, 0.15)).toBe(shown)
  })

  it('are set with raised powers, lowered indices and Greek letters', () => {
    expect(plain(setFormula('2 * n * mu * C_ox * U_T ^ 2'))).toBe('2·n·µ·C_ox·U_T^2')
    expect(plain(setFormula('sqrt(a) / -b'))).toBe('√(a) / −b')
    expect(plain(setFormula('V - V_need(J) + exp(x)'))).toBe('V − V_need(J) + exp(x)')
    expect(setFormula('V_need(J)')).toContainEqual({ text: 'need', level: 'sub' })
    expect(plain(setFormula('x ^ 2 + y', { x: -3, y: 1e12 }))).toBe('(−3)^2 + 10^12')
    expect(plain(setFormula('q / 3 * (2 * q + 3) / (a - b * c)'))).toBe('q / 3 · (2·q + 3) / (a − b·c)')
    expect(plain(setNumber(1.38064e-23))).toBe('1.381×10^−23')
  })
})
