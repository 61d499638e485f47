/**
 * Units by symbol: their size in SI, always a power of ten, and their kind. bit, Bd and UI are kinds of their own,
 * so that a data rate is not a frequency and a byte is not a bit. Logarithmic units stand alone and are never
 * multiplied.
 */

/** Exponents of the base kinds: m, kg, s, A, K, bit, byte, Bd, UI, degree of angle, and one for each logarithmic unit. */
export type Kind = Readonly<Record<string, number>>

export interface Unit {
  readonly symbol: string
  /** SI value = number × 10^exponent + offset. */
  readonly exponent: number
  readonly offset?: number
  readonly kind: Kind
  /** Whether SI prefixes may stand before it. */
  readonly prefixed: boolean
  /** Logarithmic: stands alone. */
  readonly alone?: boolean
}

const unit = (symbol: string, exponent: number, kind: Kind, prefixed = true): Unit => ({
  symbol,
  exponent,
  kind,
  prefixed,
})
const alone = (symbol: string): Unit => ({
  symbol,
  exponent: 0,
  kind: { [symbol]: 1 },
  prefixed: false,
  alone: true,
})

const VOLT: Kind = { kg: 1, m: 2, s: -3, A: -1 }
const OHM: Kind = { kg: 1, m: 2, s: -3, A: -2 }
const FARAD: Kind = { kg: -1, m: -2, s: 4, A: 2 }
const CELSIUS = { exponent: 0, offset: 273.15, kind: { K: 1 }, prefixed: false }

const UNITS: readonly Unit[] = [
  unit('m', 0, { m: 1 }),
  unit('g', -3, { kg: 1 }),
  unit('s', 0, { s: 1 }),
  unit('A', 0, { A: 1 }),
  unit('K', 0, { K: 1 }, false),
  unit('Hz', 0, { s: -1 }),
  unit('V', 0, VOLT),
  unit('W', 0, { kg: 1, m: 2, s: -3 }),
  unit('J', 0, { kg: 1, m: 2, s: -2 }),
  unit('C', 0, { A: 1, s: 1 }),
  unit('Ω', 0, OHM),
  unit('ohm', 0, OHM),
  unit('Ohm', 0, OHM),
  unit('S', 0, { kg: -1, m: -2, s: 3, A: 2 }),
  unit('F', 0, FARAD),
  unit('H', 0, { kg: 1, m: 2, s: -2, A: -2 }),
  unit('b', 0, { bit: 1 }),
  unit('bit', 0, { bit: 1 }),
  unit('B', 0, { byte: 1 }),
  unit('byte', 0, { byte: 1 }),
  unit('Bd', 0, { Bd: 1 }),
  unit('baud', 0, { Bd: 1 }, false),
  unit('UI', 0, { UI: 1 }, true),
  unit('deg', 0, { deg: 1 }, false),
  unit('°', 0, { deg: 1 }, false),
  unit('%', -2, {}, false),
  unit('ppm', -6, {}, false),
  { ...CELSIUS, symbol: '°C' },
  { ...CELSIUS, symbol: 'degC' },
  { ...CELSIUS, symbol: '℃' },
  alone('dB'),
  alone('dBm'),
  alone('dBc'),
  alone('dBc/Hz'),
]

/** SI prefixes. Both Greek letters for micro and the plain u are read. */
const PREFIXES: Readonly<Record<string, number>> = {
  a: -18,
  f: -15,
  p: -12,
  n: -9,
  µ: -6,
  μ: -6,
  u: -6,
  m: -3,
  c: -2,
  k: 3,
  M: 6,
  G: 9,
  T: 12,
}

/** Every unit with every prefix it takes; a plain unit wins over a prefixed one of the same spelling. */
const BY_SYMBOL: ReadonlyMap<string, Unit> = new Map([
  ...UNITS.filter(({ prefixed }) => prefixed).flatMap((base) =>
    Object.entries(PREFIXES).map(([prefix, size]): [string, Unit] => {
      const symbol = `${prefix}${base.symbol}`
      return [symbol, { ...base, symbol, exponent: base.exponent + size }]
    }),
  ),
  ...UNITS.map((plain): [string, Unit] => [plain.symbol, plain]),
])

/** The unit a symbol stands for, prefix included, or null. */
export function unitOf(symbol: string): Unit | null {
  return BY_SYMBOL.get(symbol) ?? null
}

/** What people write for a unit per second, as in `Gbps`. */
const PER_SECOND: Readonly<Record<string, string>> = { bps: 'b/s', 'bit/sec': 'b/s', baud: 'Bd', bd: 'Bd' }

/** Units that a mistaken symbol may have meant: the same letters in another case, or a spelling of `per second`. */
export function likelyUnits(symbol: string): readonly string[] {
  const small = symbol.toLowerCase()
  const sameLetters = [...BY_SYMBOL.keys()].filter((one) => one.toLowerCase() === small)
  if (sameLetters.length > 0) return sameLetters
  const ending = Object.keys(PER_SECOND).find((one) => small.endsWith(one))
  if (ending === undefined) return []
  const prefix = symbol.slice(0, symbol.length - ending.length)
  const proper = [prefix, prefix.toUpperCase(), prefix.toLowerCase()].find(
    (one) => one === '' || Object.hasOwn(PREFIXES, one),
  )
  return proper === undefined ? [] : [`${proper}${PER_SECOND[ending]}`]
}
