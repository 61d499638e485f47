import { parseUnit, sameKind } from './parse-unit.ts'

/** Why a text is no quantity of the wanted kind. */
export type QuantityFault =
  | { readonly why: 'not a number'; readonly found: string }
  | { readonly why: 'no unit'; readonly found: string }
  | { readonly why: 'unknown unit'; readonly found: string; readonly likely: readonly string[] }
  | { readonly why: 'wrong kind'; readonly found: string; readonly hint: string | null }

export type QuantityOutcome =
  | { readonly ok: true; readonly value: number }
  | { readonly ok: false; readonly fault: QuantityFault }

const NUMBER = /^([+-]?(?:\d+(?:_\d+)*\.?\d*|\.\d+))(?:e([+-]?\d+))?(?![\d.])/i

/**
 * Reads a quantity in SI.
 *
 * The digits keep their decimal form until the end, so that 120 fF and 0.12 pF are the same number to the bit.
 *
 * @param text such as `112 Gb/s`, `-228 dBc/Hz`, `-40 °C`, `0.10`
 * @param wanted SI unit of the kind wanted, `1` for a plain number
 * @returns the SI value, or why there is none
 */
export function parseQuantity(text: string, wanted: string): QuantityOutcome {
  const plain = text
    .replace(/[−–]/g, '-')
    .replace(/[\u00a0\u2007\u202f\u2009]/g, ' ')
    .trim()
  const match = NUMBER.exec(plain)
  if (match === null) return fault({ why: 'not a number', found: text })
  const [all, digits, power] = match as unknown as readonly [string, string, string | undefined]
  const rest = plain.slice(all.length).trim()
  const target = parseUnit(wanted)
  if (!target.ok) throw new Error(`the declared unit ${wanted} cannot be read`)
  const dimensionless = Object.keys(target.unit.kind).length === 0
  if (rest === '' && !dimensionless) return fault({ why: 'no unit', found: text })
  const read = parseUnit(rest)
  if (!read.ok) return fault({ why: 'unknown unit', found: read.found, likely: read.likely })
  if (!sameKind(read.unit.kind, target.unit.kind))
    return fault({ why: 'wrong kind', found: rest, hint: hintFor(read.unit.kind, wanted) })
  return {
    ok: true,
    value: scaled(digits.replaceAll('_', ''), Number(power ?? '0') + read.unit.exponent, read.unit.offset),
  }
}

function scaled(digits: string, exponent: number, offset: number): number {
  const value = Number.isInteger(exponent) ? Number(`${digits}e${exponent}`) : Number(digits) * 10 ** exponent
  return offset === 0 ? value : Number((value + offset).toPrecision(14))
}

const fault = (why: QuantityFault): QuantityOutcome => ({ ok: false, fault: why })

function hintFor(kind: Readonly<Record<string, number>>, wanted: string): string | null {
  if (wanted === 'K' && kind.A === 1 && kind.s === 1) return 'C is the coulomb; a temperature is in °C or K'
  if (kind.byte !== undefined) return 'B is bytes; bits are written b, as in Gb/s'
  if (wanted === 'bit/s' && kind.Bd !== undefined) return 'Bd counts symbols; a data rate is in b/s'
  if (wanted === 'bit/s' && kind.s === -1) return 'Hz counts cycles; a data rate is in b/s'
  if (wanted === 'Hz' && kind.bit !== undefined) return 'b/s counts bits; a frequency is in Hz'
  if (wanted === 'Hz' && kind.Bd !== undefined) return 'Bd counts symbols; a frequency is in Hz'
  return null
}
