import { describe, expect, test } from 'vitest'
import { nodeKeys } from '../../src/nodes/keys.ts'
import { formatNumber, formatQuantity } from '../../src/quantity/format.ts'
import { parseQuantity } from '../../src/quantity/parse-quantity.ts'
import { parseUnit } from '../../src/quantity/parse-unit.ts'
import { optionKeys } from '../../src/scenario/keys/index.ts'
import type { Keys } from '../../src/scenario/schema.ts'

const si = (text: string, unit: string): number => {
  const read = parseQuantity(text, unit)
  if (!read.ok) throw new Error(`${text}: ${JSON.stringify(read.fault)}`)
  return read.value
}
const why = (text: string, unit: string) => {
  const read = parseQuantity(text, unit)
  return read.ok ? 'read' : read.fault
}

describe('published: SI prefixes and units (BIPM SI Brochure, 9th edition)', () => {
  test.each([
    ['112 Gb/s', 'bit/s', 112e9],
    ['10.3125 Gb/s', 'bit/s', 10.3125e9],
    ['28 GHz', 'Hz', 28e9],
    ['28 dB', 'dB', 28],
    ['120 fF', 'F', 120e-15],
    ['0.12 pF', 'F', 120e-15],
    ['0.23 UI', 'UI', 0.23],
    ['-228 dBc/Hz', 'dBc/Hz', -228],
    ['−228 dBc/Hz', 'dBc/Hz', -228],
    ['-40 °C', 'K', 233.15],
    ['27 degC', 'K', 300.15],
    ['300 K', 'K', 300],
    ['330 cm²/(V·s)', 'm^2/(V*s)', 0.033],
    ['330 cm2/Vs', 'm^2/(V*s)', 0.033],
    ['330 cm^2/(V*s)', 'm^2/(V*s)', 0.033],
    ['8.4 fF/µm²', 'F/m^2', 8.4e-3],
    ['8.4 fF/um^2', 'F/m^2', 8.4e-3],
    ['0.63 fF/μm', 'F/m', 0.63e-9],
    ['200 Ω·µm', 'ohm*m', 200e-6],
    ['200 ohm*um', 'ohm*m', 200e-6],
    ['0.45 mA/µm', 'A/m', 450],
    ['5 mV·µm', 'V*m', 5e-9],
    ['10 nV/√Hz', 'V/Hz^0.5', 10e-9],
    ['10 nV/sqrt(Hz)', 'V/Hz^0.5', 10e-9],
    ['150 MHz/V', 'Hz/V', 150e6],
    ['25 fF/A', 'F/A', 25e-15],
    ['15 %', '1', 0.15],
    ['0.10', '1', 0.1],
    ['1e-6', '1', 1e-6],
    ['22 V/µm', 'V/m', 22e6],
    ['5.2e-8 V²/GHz', 'V^2/Hz', 5.2e-17],
    ['1.13e+05 m/s', 'm/s', 1.13e5],
    ['900 µm', 'm', 900e-6],
    ['156.25 MHz', 'Hz', 156.25e6],
  ])('%s in %s', (text, unit, value) => {
    expect(si(text, unit)).toBe(value)
  })

  test('law: one quantity in any spelling is one number to the bit', () => {
    expect(si('0.12 pF', 'F')).toBe(si('120 fF', 'F'))
    expect(si('0.28 GHz', 'Hz')).toBe(si('280 MHz', 'Hz'))
    expect(si('0.3 V', 'V')).toBe(si('300 mV', 'V'))
  })
})

describe('refused', () => {
  test.each([
    ['112 GB/s', 'bit/s', { why: 'wrong kind', hint: 'B is bytes; bits are written b, as in Gb/s' }],
    ['112 GHz', 'bit/s', { why: 'wrong kind' }],
    ['56 GBd', 'bit/s', { why: 'wrong kind' }],
    ['56 Gb/s', 'Hz', { why: 'wrong kind' }],
    ['12', 'Hz', { why: 'no unit' }],
    ['12 GHZ', 'Hz', { why: 'unknown unit', likely: ['GHz'] }],
    ['12 dB', 'Hz', { why: 'wrong kind' }],
    ['3 dB/m', 'dB', { why: 'unknown unit' }],
    ['fast', 'Hz', { why: 'not a number' }],
    ['.nan', 'Hz', { why: 'not a number' }],
    ['1.2.3 GHz', 'Hz', { why: 'not a number' }],
    ['1,5 GHz', 'Hz', { why: 'unknown unit' }],
    ['3 °C/V', 'K', { why: 'unknown unit' }],
    ['3 V/(m', 'V/m', { why: 'unknown unit' }],
    ['5 V', '1', { why: 'wrong kind' }],
  ])('%s where %s is due', (text, unit, fault) => {
    expect(why(text, unit)).toMatchObject(fault)
  })
})

describe('shown to people', () => {
  test.each([
    [14e9, 'Hz', undefined, '14 GHz'],
    [0.15, '1', '%', '15 %'],
    [233.15, 'K', '°C', '−40 °C'],
    [56e9, 'bit/s', 'Gb/s', '56 Gb/s'],
    [2.73e-12, 's', undefined, '2.73 ps'],
    [999.9e6, 'Hz', undefined, '1 GHz'],
    [450, 'A/m', undefined, '450 µA/µm'],
    [0.05, 'V', 'mV', '50 mV'],
    [-228, 'dBc/Hz', undefined, '−228 dBc/Hz'],
    [0, 'V', undefined, '0 V'],
    [1.23456, '1', undefined, '1.23'],
    [0.033, 'm^2/(V*s)', 'cm²/(V·s)', '330 cm²/(V·s)'],
  ] as const)('%s %s', (value, unit, shown, text) => {
    expect(formatQuantity(value, unit, shown)).toBe(text)
  })

  test('law: what is shown can be read back', () => {
    for (const value of [1.5e-15, 2e-12, 3.25e-9, 4e-6, 5e-3, 6, 7e3, 8e6, 9.5e9, 1e11]) {
      for (const unit of ['Hz', 's', 'V', 'A', 'F', 'ohm', 'A/m', 'F/m']) {
        const back = si(formatQuantity(value, unit, undefined, 6).replace(/e−/, 'e-'), unit)
        expect(Math.abs(back / value - 1)).toBeLessThan(1e-5)
      }
    }
  })

  test('small and large plain numbers', () => {
    expect(formatNumber(1.25e-9)).toBe('1.25e−9')
    expect(formatNumber(-0.5)).toBe('−0.5')
  })
})

test('every unit and shown unit of the key declarations can be read', () => {
  const walk = (keys: Keys): void => {
    for (const key of Object.values(keys)) {
      if (key.type === 'group' || key.type === 'section') walk(key.keys)
      if ('unit' in key) expect(parseUnit(key.unit).ok, key.unit).toBe(true)
      if ('shown' in key && key.shown !== undefined) expect(parseUnit(key.shown).ok, key.shown).toBe(true)
    }
  }
  walk(optionKeys)
  walk(nodeKeys)
})

describe('law: any text is read or refused, never thrown, in a moment', () => {
  const pieces = [
    'V',
    'm',
    '/',
    '*',
    '·',
    '(',
    ')',
    '^',
    '2',
    '-1',
    '√',
    'Hz',
    'dB',
    'c',
    'µ',
    ' ',
    '°C',
    '%',
    '²',
    '.',
    'e',
    '−',
    'rt',
    '\u0000',
  ]
  test('units made of pieces', () => {
    let state = 1
    const roll = (sides: number): number => {
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0
      return Math.floor((state / 2 ** 32) * sides)
    }
    for (let k = 0; k < 3000; k++) {
      const text = `1 ${Array.from({ length: 1 + roll(8) }, () => pieces[roll(pieces.length)]).join('')}`
      const read = parseQuantity(text, 'V')
      if (read.ok) expect(Number.isNaN(read.value), text).toBe(false)
    }
  })

  test('long texts', () => {
    const begin = performance.now()
    for (const text of [
      `1 ${'V*'.repeat(1e5)}V`,
      `1${'0'.repeat(1e6)} V`,
      `1 ${'('.repeat(1e6)}`,
      ' '.repeat(1e6),
    ])
      parseQuantity(text, 'V')
    expect(performance.now() - begin).toBeLessThan(5000)
  })
})
