import type { Bench } from '../blocks/bench.ts'
import type { Outcome } from '../blocks/sub-block.ts'
import { formula } from '../derivation/formula.ts'
import { marginInDecibel } from '../derivation/margin.ts'
import { BOLTZMANN } from '../device/conditions.ts'
import type { ClockLoop } from './loop/clock-loop.ts'

/** Whether a measured oscillator is better than any oscillator of its power can be. */

/** FoM = −L + 20 log10(f_max/Δf) − 10 log10(P/P_0). L [dBc/Hz], f_max [Hz], df [Hz], P_osc [W], P_0 [W] → [dB]. */
export const oscillatorMerit = formula(
  {
    symbol: 'FoM',
    meaning: 'figure of merit of the measured oscillator at its best offset',
    unit: 'dB',
    source: 'definition',
  },
  (L, f_max, df, P_osc, P_0) => -L + 20 * Math.log10(f_max / df) - 10 * Math.log10(P_osc / P_0),
)

/** FoM ≤ −10 log10(7.33 k_B T/(P_0 s)): the least noise of a ring. k_B [J/K], T [K], P_0 [W], t_1 [s] → [dB]. */
export const ringCeiling = formula(
  {
    symbol: 'FoM_most',
    meaning: 'largest figure of merit that thermodynamics allow a ring',
    unit: 'dB',
    source: 'R. Navid, T. H. Lee, R. W. Dutton, IEEE JSSC 40(3), 2005',
  },
  (k_B, T, P_0, t_1) => -10 * Math.log10((7.33 * k_B * T) / (P_0 * t_1)),
)

/** FoM ≤ −10 log10((1 + γ) k_B T/(2 η Q_t² P_0 s)), η = 2/π. gamma [1], k_B [J/K], T [K], Q_t [1], P_0 [W], t_1 [s] → [dB]. */
export const tankCeiling = formula(
  {
    symbol: 'FoM_Q',
    meaning: 'largest figure of merit of a tank of this quality factor with square-wave currents',
    unit: 'dB',
    source: 'M. Garampazzi et al., IEEE JSSC 49(3), 2014, for square-wave currents',
  },
  (gamma, k_B, T, Q_t, P_0, t_1) =>
    -10 * Math.log10(((1 + gamma) * k_B * T) / (2 * (2 / Math.PI) * Q_t ** 2 * P_0 * t_1)),
)

/** The smaller of both. FoM_most [dB], FoM_Q [dB] → [dB]. */
export const lowerCeiling = formula(
  { symbol: 'FoM_most', meaning: 'largest credible figure of merit', unit: 'dB', source: 'definition' },
  (FoM_most, FoM_Q) => Math.min(FoM_most, FoM_Q),
)

const ONE_MILLIWATT = {
  symbol: 'P_0',
  meaning: 'power that figures of merit refer to',
  unit: 'W',
  source: 'definition',
  value: 1e-3,
}
const ONE_SECOND = {
  symbol: 't_1',
  meaning: 'inverse of the bandwidth of a density',
  unit: 's',
  source: 'definition',
  value: 1,
}
const TANK_CEILING = {
  symbol: 'FoM_most',
  meaning: 'largest figure of merit that is credible for a tank on a chip',
  unit: 'dB',
  source: 'published silicon: none above 197 dBc/Hz at an offset ruled by thermal noise',
  value: 197,
}

/** The measured profile's best figure of merit against what physics, or published silicon, allow at its power. */
export function ceilingOutcome({ sources }: ClockLoop, { settings, nmos, t, at }: Bench): Outcome {
  const { phase_noise, range, kind } = settings.oscillator!
  const P_0 = t.leaf(ONE_MILLIWATT, ONE_MILLIWATT.value)
  const [f, L] = bestRow(phase_noise!)
  const row = { unit: 'Hz', source: 'this scenario', path: 'oscillator.phase_noise' }
  const df = t.leaf({ ...row, symbol: 'df', meaning: 'offset at which the profile is best' }, f)
  const level = t.leaf({ ...row, symbol: 'L', meaning: 'measured phase noise there', unit: 'dBc/Hz' }, L)
  const available = t.calc(oscillatorMerit, level, range[1], df, sources.oscillator.power, P_0)
  const t_1 = t.leaf(ONE_SECOND, ONE_SECOND.value)
  const required =
    kind === 'LC'
      ? credibleTank(settings.oscillator!.tank_q, P_0, t_1, { nmos, at, t })
      : t.calc(ringCeiling, BOLTZMANN.value, at.T, P_0, t_1)
  return {
    required,
    available,
    margin: t.calc(marginInDecibel, required, available),
    basis: kind === 'LC' ? 'published silicon, or the stated quality factor' : 'thermodynamics',
    ...(available <= required
      ? {}
      : {
          reason:
            'the measured profile is better than any such oscillator of this power: check its offsets, level and current',
        }),
  }
}

/** What published silicon reaches, and no more than a stated quality factor allows. */
function credibleTank(
  tank_q: number | null,
  P_0: number,
  t_1: number,
  { nmos, at, t }: Pick<Bench, 'nmos' | 'at' | 't'>,
): number {
  const published = t.leaf(TANK_CEILING, TANK_CEILING.value)
  if (tank_q === null) return published
  const FoM_Q = t.calc(tankCeiling, nmos.of.gamma, BOLTZMANN.value, at.T, tank_q, P_0, t_1)
  return t.calc(lowerCeiling, published, FoM_Q)
}

/** The row of the best figure of merit: least of level plus 20 log10 of the offset. */
function bestRow(rows: readonly (readonly number[])[]): readonly [number, number] {
  const merit = ([f, L]: readonly number[]): number => L! + 20 * Math.log10(f!)
  const best = rows.reduce((least, row) => (merit(row) < merit(least) ? row : least))
  return [best[0]!, best[1]!]
}
