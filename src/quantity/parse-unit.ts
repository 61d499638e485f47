import { type Kind, likelyUnits, type Unit, unitOf } from './unit-table.ts'

/** A unit expression read: SI value = number × 10^exponent + offset. */
export interface UnitRead {
  readonly exponent: number
  readonly offset: number
  readonly kind: Kind
}

export type UnitOutcome =
  | { readonly ok: true; readonly unit: UnitRead }
  | { readonly ok: false; readonly found: string; readonly likely: readonly string[] }

const SUPERSCRIPTS: Readonly<Record<string, string>> = {
  '⁻': '-',
  '⁰': '0',
  '¹': '1',
  '²': '2',
  '³': '3',
  '⁴': '4',
}

/** Writes signs that look alike in one way: minus, middle dots, powers, roots, non-breaking spaces. */
function plainSigns(text: string): string {
  if (/^[\x20-\x7e]*$/.test(text) && !/rt/.test(text)) return text.trim()
  return text
    .normalize('NFC')
    .replace(/[\u00a0\u2007\u202f\u2009]/g, ' ')
    .replace(/[−–]/g, '-')
    .replace(/[·⋅×∙]/g, '*')
    .replace(/Ω/g, 'Ω')
    .replace(/[⁻⁰¹²³⁴]+/g, (run) => `^${[...run].map((sign) => SUPERSCRIPTS[sign]).join('')}`)
    .replace(/√\(?([A-Za-zΩ]+)\)?/g, '$1^0.5')
    .replace(/(?:sqrt|rt)\(?([A-Za-zΩ]+)\)?/g, '$1^0.5')
    .trim()
}

/** No symbol, nor two written together, is longer. */
const LONGEST = 12

const ALONE = /^dB(?:m|c(?:\/Hz)?)?$/
const FACTOR = /\s*([*/]?)\s*(\(?)\s*([A-Za-z%µμΩ°℃]+)(?:\^?(-?\d+(?:\.\d+)?))?\s*(\)?)/y

/**
 * Reads a unit expression such as `fF/µm²`, `cm2/Vs`, `nV/√Hz` or `dBc/Hz`.
 *
 * @param text the expression; products by `*`, `·` or a space, quotients by `/`, powers by `^`, digits or
 * superscripts; one pair of parentheses after a slash
 * @returns exponent of ten, offset and kind; or the part that is no unit, with likely ones
 */
export function parseUnit(text: string): UnitOutcome {
  const whole = unitOf(text)
  if (whole !== null)
    return { ok: true, unit: { exponent: whole.exponent, offset: whole.offset ?? 0, kind: whole.kind } }
  const plain = plainSigns(text)
  if (plain === '' || plain === '1') return { ok: true, unit: { exponent: 0, offset: 0, kind: {} } }
  if (ALONE.test(plain)) return { ok: true, unit: { exponent: 0, offset: 0, kind: { [plain]: 1 } } }
  return parseProduct(plain)
}

function parseProduct(plain: string): UnitOutcome {
  let [exponent, offset, under, inside] = [0, 0, false, false]
  const kind: Record<string, number> = {}
  FACTOR.lastIndex = 0
  for (let at = 0, first = true; at < plain.length; first = false) {
    FACTOR.lastIndex = at
    const match = FACTOR.exec(plain)
    if (match === null) return unknown(plain.slice(at).trim())
    const [all, sign, open, symbol, power, close] = match as unknown as readonly [
      string,
      string,
      string,
      string,
      string | undefined,
      string,
    ]
    at += all.length
    if ((close !== '') !== (open !== '' || inside) && close !== '') return unknown(plain)
    under = inside ? under : sign === '/'
    const units = unitsOf(symbol)
    if (units === null) return unknown(symbol)
    if (units.some((one) => one.alone === true)) return unknown(plain)
    if (
      units.some((one) => one.offset !== undefined) &&
      !(first && at === plain.length && power === undefined)
    )
      return unknown(plain)
    units.forEach((one, k) => {
      const times = (k === units.length - 1 ? Number(power ?? '1') : 1) * (under ? -1 : 1)
      exponent += one.exponent * times
      offset += one.offset ?? 0
      for (const [base, count] of Object.entries(one.kind)) kind[base] = (kind[base] ?? 0) + count * times
    })
    inside = (inside || open !== '') && close === ''
  }
  return inside ? unknown(plain) : { ok: true, unit: { exponent, offset, kind: withoutZeros(kind) } }
}

/** A symbol as one unit, or as two written together such as `Vs`. */
function unitsOf(symbol: string): readonly Unit[] | null {
  if (symbol.length > LONGEST) return null
  const one = unitOf(symbol)
  if (one !== null) return [one]
  for (let k = 1; k < symbol.length; k++) {
    const [left, right] = [unitOf(symbol.slice(0, k)), unitOf(symbol.slice(k))]
    if (left !== null && right !== null && left.symbol.length <= 2 && 'smA'.includes(right.symbol))
      return [left, right]
  }
  return null
}

const unknown = (found: string): UnitOutcome => ({ ok: false, found, likely: likelyUnits(found) })

const withoutZeros = (kind: Kind): Kind =>
  Object.fromEntries(Object.entries(kind).filter(([, count]) => Math.abs(count) > 1e-12))

/** Whether two kinds are the same. */
export function sameKind(a: Kind, b: Kind): boolean {
  const names = new Set([...Object.keys(a), ...Object.keys(b)])
  return [...names].every((name) => Math.abs((a[name] ?? 0) - (b[name] ?? 0)) < 1e-9)
}
