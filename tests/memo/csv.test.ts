import { describe, expect, it } from 'vitest'
import { assumptionsCsv, cellText, checksCsv } from '../../src/memo/csv.ts'
import type { Result } from '../../src/verdict/result.ts'
import { aResult } from '../cli/a-result.ts'

/** RFC 4180, read independently of how it is written. */
function readCsv(text: string): readonly (readonly string[])[] {
  const rows: string[][] = [['']]
  let quoted = false
  for (let k = 0; k < text.length; k++) {
    const c = text[k]!
    const row = rows[rows.length - 1]!
    if (quoted && c === '"' && text[k + 1] === '"') {
      row[row.length - 1] += '"'
      k++
    } else if (c === '"') quoted = !quoted
    else if (!quoted && c === ',') row.push('')
    else if (!quoted && c === '\r' && text[k + 1] === '\n') {
      rows.push([''])
      k++
    } else row[row.length - 1] += c
  }
  rows.pop()
  return rows
}

describe('CSV of checks', () => {
  const result = aResult(['a', 'b'], ['P28', 'F16'])

  it('law: read back, every number is the one that was written, to the last bit', () => {
    const [head, ...rows] = readCsv(checksCsv(result))
    const checks = result.cases.flatMap(({ checks }) => checks)
    expect(rows).toHaveLength(checks.length)
    const of = (row: readonly string[], name: string): string => row[head!.indexOf(name)]!
    rows.forEach((row, k) => {
      const check = checks[k]!
      expect(row).toHaveLength(head!.length)
      for (const [name, value] of [
        ['margin', check.margin],
        ['required', check.required],
        ['available', check.available],
      ] as const) {
        expect(of(row, name) === '' ? null : Number(of(row, name))).toBe(value)
      }
      expect(of(row, 'verdict')).toBe(check.verdict)
    })
  })

  it('keeps commas, quotes and line ends within their cell', () => {
    const nasty: Result = {
      ...result,
      cases: result.cases.map((one) => ({
        ...one,
        checks: one.checks.map((check) => ({ ...check, title: 'a "b", c\nd', reason: 'x,y' })),
      })),
    }
    const [head, first] = readCsv(checksCsv(nasty))
    expect(first![head!.indexOf('title')]).toBe('a "b", c d')
    expect(first![head!.indexOf('reason')]).toBe('x,y')
  })

  it('lists assumptions with their lists and spreads', () => {
    const given: Result = {
      ...result,
      assumptions: [
        {
          path: 'oscillator.range',
          value: [1e9, 2e9],
          unit: 'Hz',
          source: '=HYPERLINK("x")',
          evidence: 'given',
          origin: 'scenario',
        },
      ],
    }
    expect(readCsv(assumptionsCsv(given))[1]).toEqual([
      'oscillator.range',
      '1000000000; 2000000000',
      '',
      '',
      'Hz',
      'scenario',
      'given',
      '\'=HYPERLINK("x")',
    ])
  })
})

describe('cells', () => {
  it.each(['=1+1', '+1', '-1+2', '@SUM(A1)', '\t=1', '\r=1', '＝1', ' =1'])(
    'text that a spreadsheet would run is disarmed: %j',
    (text) => {
      expect(cellText(text)).toMatch(/^"?'/)
    },
  )

  it('numbers stay numbers, also negative ones; what is unknown stays empty', () => {
    expect(cellText(-1.5)).toBe('-1.5')
    expect(cellText(null)).toBe('')
    expect(cellText(Number.NaN)).toBe('')
    expect(cellText(true)).toBe('yes')
  })
})
