import { formula } from '../derivation/formula.ts'
import type { Given, Trace } from '../derivation/trace.ts'
import type { Case } from './bench.ts'

const DEFINITION = 'definition'

/** f_B = R_b/b. R_b [bit/s], b [1] bits a symbol → [Bd]. */
export const symbolRate = formula(
  { symbol: 'f_B', meaning: 'symbol rate', unit: 'Hz', source: DEFINITION },
  (R_b, b) => R_b / b,
)

/** f_N = f_B/2. f_B [Hz] → [Hz]. */
export const nyquistFrequency = formula(
  { symbol: 'f_N', meaning: 'Nyquist frequency', unit: 'Hz', source: DEFINITION },
  (f_B) => f_B / 2,
)

/** UI = 1/f_B. f_B [Hz] → [s]. */
export const unitInterval = formula(
  { symbol: 'UI', meaning: 'unit interval', unit: 's', source: DEFINITION },
  (f_B) => 1 / f_B,
)

/** f_ck = f_B/p. f_B [Hz], p [1] phases → [Hz]. */
export const clockFrequency = formula(
  { symbol: 'f_ck', meaning: 'clock frequency', unit: 'Hz', source: DEFINITION },
  (f_B, p) => f_B / p,
)

const BITS: Given = {
  symbol: 'b',
  meaning: 'bits a symbol',
  unit: '1',
  source: DEFINITION,
  path: 'modulation',
}
const PHASES: Given = {
  symbol: 'p',
  meaning: 'symbols a clock period',
  unit: '1',
  source: DEFINITION,
  path: 'clocking',
}

/** Rates of a case. A clock block has only the clock frequency; the others are null. */
export interface Rates {
  readonly f_B: number | null
  readonly f_N: number | null
  readonly UI: number | null
  readonly f_ck: number
  /** Symbols a clock period. */
  readonly p: number
  /** Levels of the modulation. */
  readonly levels: number
}

const BITS_OF = { 'PAM-2': 1, 'PAM-4': 2, 'PAM-8': 3 } as const
const PHASES_OF = { 'full-rate': 1, 'half-rate': 2, 'quarter-rate': 4, 'eighth-rate': 8 } as const

/**
 * Symbol rate, Nyquist frequency, unit interval and clock frequency of a case.
 *
 * Errors: throws when a link lacks rate, modulation or clocking, which reading a scenario refuses.
 */
export function ratesOf({ block, settings }: Pick<Case, 'block' | 'settings'>, t: Trace): Rates {
  const { data_rate, modulation, clocking, clock, oscillator } = settings
  if (block === 'clock') {
    const f_ck = clock.frequency ?? oscillator?.range[1]
    if (f_ck === undefined) throw new Error('a clock block without oscillator reached the evaluation')
    return { f_B: null, f_N: null, UI: null, f_ck, p: 1, levels: 2 }
  }
  if (data_rate === null || modulation === null || clocking === null) {
    throw new Error('a link without rate, modulation or clocking reached the evaluation')
  }
  const bits = t.leaf(BITS, BITS_OF[modulation])
  const p = t.leaf(PHASES, PHASES_OF[clocking])
  const f_B = t.calc(symbolRate, data_rate, bits)
  return {
    f_B,
    f_N: t.calc(nyquistFrequency, f_B),
    UI: t.calc(unitInterval, f_B),
    f_ck: t.calc(clockFrequency, f_B, p),
    p,
    levels: 2 ** bits,
  }
}
