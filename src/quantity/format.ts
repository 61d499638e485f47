import { parseUnit } from './parse-unit.ts'

/** How units of derivations are shown: the part that takes a prefix, and what follows it. */
const SHOWN: Readonly<
  Record<string, { readonly base: string; readonly rest: string; readonly exponent: number }>
> = {
  Hz: { base: 'Hz', rest: '', exponent: 0 },
  'bit/s': { base: 'b/s', rest: '', exponent: 0 },
  s: { base: 's', rest: '', exponent: 0 },
  V: { base: 'V', rest: '', exponent: 0 },
  A: { base: 'A', rest: '', exponent: 0 },
  W: { base: 'W', rest: '', exponent: 0 },
  F: { base: 'F', rest: '', exponent: 0 },
  H: { base: 'H', rest: '', exponent: 0 },
  ohm: { base: 'Ω', rest: '', exponent: 0 },
  S: { base: 'S', rest: '', exponent: 0 },
  m: { base: 'm', rest: '', exponent: 0 },
  J: { base: 'J', rest: '', exponent: 0 },
  'J/bit': { base: 'J/b', rest: '', exponent: 0 },
  'Hz/V': { base: 'Hz/V', rest: '', exponent: 0 },
  C: { base: 'C', rest: '', exponent: 0 },
  'A/m': { base: 'A', rest: '/µm', exponent: -6 },
  'S/m': { base: 'S', rest: '/µm', exponent: -6 },
  'F/m': { base: 'F', rest: '/µm', exponent: -6 },
  'V/m': { base: 'V', rest: '/µm', exponent: -6 },
  'F/m^2': { base: 'F', rest: '/µm²', exponent: -12 },
  'F/A': { base: 'F', rest: '/A', exponent: 0 },
  'ohm*m': { base: 'Ω', rest: '·µm', exponent: 6 },
  'V*m': { base: 'V', rest: '·µm', exponent: 6 },
}

const PREFIXES = new Map([
  [-18, 'a'],
  [-15, 'f'],
  [-12, 'p'],
  [-9, 'n'],
  [-6, 'µ'],
  [-3, 'm'],
  [0, ''],
  [3, 'k'],
  [6, 'M'],
  [9, 'G'],
  [12, 'T'],
])

/** Powers of ten shown with a raised exponent in units: `m^2/(V*s)` as `m²/(V·s)`. */
function prettyUnit(unit: string): string {
  return unit
    .replace(/\^2/g, '²')
    .replace(/\^3/g, '³')
    .replace(/\*/g, '·')
    .replace(/\bohm\b/g, 'Ω')
}

/** A number with so many significant digits, without trailing zeros and without a needless exponent. */
export function formatNumber(value: number, digits = 3): string {
  if (value === 0) return '0'
  if (!Number.isFinite(value)) return Number.isNaN(value) ? 'not a number' : value > 0 ? '∞' : '−∞'
  const size = Math.abs(value)
  if (size >= 1e6 || size < 1e-3) {
    const [mantissa, exponent] = value.toExponential(digits - 1).split('e') as [string, string]
    return `${trimmed(mantissa)}e${Number(exponent)}`.replace('-', '−').replace('e-', 'e−')
  }
  const places = Math.max(0, digits - 1 - Math.floor(Math.log10(size)))
  return trimmed(value.toFixed(Math.min(places, 12))).replace('-', '−')
}

const trimmed = (text: string): string =>
  text.includes('.') ? text.replace(/0+$/, '').replace(/\.$/, '') : text

/**
 * A quantity for people.
 *
 * @param value in SI
 * @param unit its SI unit; `1` for a plain number, `K` is shown in °C when `shown` says so
 * @param shown unit to show it in; chosen with a suitable prefix when absent
 * @param digits significant digits
 */
export function formatQuantity(value: number, unit: string, shown?: string, digits = 3): string {
  if (shown !== undefined && shown !== unit) {
    const read = parseUnit(shown)
    if (read.ok)
      return withUnit(formatNumber((value - read.unit.offset) / 10 ** read.unit.exponent, digits), shown)
  }
  if (unit === '1') return formatNumber(value, digits)
  const known = SHOWN[unit]
  if (known === undefined) return withUnit(formatNumber(value, digits), prettyUnit(unit))
  return prefixed(value, known, digits)
}

/** Two limits for people: with a suitable prefix each where the unit takes one, else in the unit shown. */
export function formatLimits(min: number, max: number, unit: string, shown?: string): string {
  const one = (value: number): string => formatQuantity(value, unit, unit in SHOWN ? undefined : shown)
  return `${one(min)} to ${one(max)}`
}

function prefixed(
  value: number,
  { base, rest, exponent }: { base: string; rest: string; exponent: number },
  digits: number,
): string {
  const scaled = value * 10 ** exponent
  if (scaled === 0 || !Number.isFinite(scaled)) return withUnit(formatNumber(scaled), `${base}${rest}`)
  const rounded = Number(Math.abs(scaled).toPrecision(digits))
  const step = Math.min(12, Math.max(-18, Math.floor(Math.log10(rounded) / 3 + 1e-12) * 3))
  return withUnit(formatNumber(scaled / 10 ** step, digits), `${PREFIXES.get(step)}${base}${rest}`)
}

const withUnit = (number: string, unit: string): string => `${number} ${unit}`
