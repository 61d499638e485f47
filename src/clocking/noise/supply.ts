import { formula } from '../../derivation/formula.ts'

/** What the supply does to the oscillator. */

/** K_push = k_push f_0. k_push [1/V], f_0 [Hz] → [Hz/V]. */
export const pushingOf = formula(
  { symbol: 'K_push', meaning: 'supply pushing of the oscillator', unit: 'Hz/V', source: 'definition' },
  (k_push, f_0) => k_push * f_0,
)

/** p_2 = e_reg² K_push²/2: density times the square of the offset. e_reg [V/Hz^0.5], K_push [Hz/V] → [Hz]. */
export const pushedNoise = formula(
  {
    symbol: 'p_2',
    meaning: 'density times the square of the offset that the supply noise adds',
    unit: 'Hz',
    source: 'derived: narrow-band frequency modulation, single sideband',
  },
  (e_reg, K_push) => (e_reg ** 2 * K_push ** 2) / 2,
)

/** J_pp = K_push V_pp |1 − H|/(2πf_m f_0): a tone of V_pp swings the frequency by K_push V_pp peak to peak. K_push [Hz/V], V_pp [V], E_m [1] = |1 − H| at f_m, f_m [Hz], f_0 [Hz] → [s]. */
export const toneJitter = formula(
  {
    symbol: 'J_tone',
    meaning: 'jitter of a tone on the supply, peak to peak',
    unit: 's',
    source:
      'derived: phase is the integral of frequency, so a swing of K_push V_pp gives K_push V_pp/f_m of phase peak to peak',
  },
  (K_push, V_pp, E_m, f_m, f_0) => (K_push * V_pp * E_m) / (2 * Math.PI * f_m * f_0),
)

/** Pushing over frequency by kind of oscillator. */
export const PUSHING = {
  LC: {
    symbol: 'k_push',
    meaning: 'pushing of an LC oscillator over its frequency',
    unit: '1/V',
    source: 'common practice, no source: 150 MHz/V at 14 GHz',
    value: 150e6 / 14e9,
  },
  ring: {
    symbol: 'k_push',
    meaning: 'pushing of a ring over its frequency',
    unit: '1/V',
    source: 'common practice, no source',
    value: 0.5,
  },
} as const
