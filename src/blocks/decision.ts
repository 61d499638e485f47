import { formula } from '../derivation/formula.ts'
import type { Given, Trace } from '../derivation/trace.ts'
import type { Bench } from './bench.ts'

/** What every decision circuit shares: its time constant, the growth it needs, the clock it decides on. */

const LATCH =
  'H. J. M. Veendrick, IEEE JSSC 15(2), 1980; B. Razavi, The StrongARM latch, IEEE Solid-State Circuits Magazine 7(2), 2015'
const COMMON = 'common practice, no source'

type Constant = Given & { readonly value: number }

/** κ_r: regeneration time constant in units of 1/(2π f_T) of the device as laid out. */
export const REGENERATION: Constant = {
  symbol: 'kappa_r',
  meaning: 'regeneration time constant in transit times of the device as laid out',
  unit: '1',
  source: 'derived: 2.73 ps at 28 nm and 1.0 V, measured 2.78 ps',
  value: 2.6,
}
export const LOGIC_LEVEL: Constant = {
  symbol: 'V_L',
  meaning: 'differential level that counts as decided',
  unit: 'V',
  source: COMMON,
  value: 0.5,
}
export const INTEGRATION_GAIN: Constant = {
  symbol: 'A0',
  meaning: 'gain before regeneration starts',
  unit: '1',
  source: COMMON,
  value: 3,
}
/** Time constants that integration and reset of a dynamic latch take. */
export const INTEGRATION: Constant = {
  symbol: 'n_int',
  meaning: 'time constants for integration and reset of a dynamic latch',
  unit: '1',
  source: COMMON,
  value: 6,
}

/** G = ln(V_L/(A0 V_min)). V_L [V], A0 [1], V_min [V] → [1]. */
export const growth = formula(
  {
    symbol: 'G_r',
    meaning: 'time constants that regeneration needs from the smallest input',
    unit: '1',
    source: LATCH,
  },
  (V_L, A0, V_min) => Math.log(V_L / (A0 * V_min)),
)

/** Time constants of regeneration from the smallest input [1]. */
export function growthOf({ settings, t }: Bench): number {
  return t.calc(
    growth,
    t.leaf(LOGIC_LEVEL, LOGIC_LEVEL.value),
    t.leaf(INTEGRATION_GAIN, INTEGRATION_GAIN.value),
    settings.receiver.smallest_input,
  )
}

/** τ = κ_r/(2π f_T). kappa_r [1], f_T_eff [Hz] → [s]. */
export const regenerationTime = formula(
  { symbol: 'tau', meaning: 'regeneration time constant', unit: 's', source: LATCH },
  (kappa_r, f_T_eff) => kappa_r / (2 * Math.PI * f_T_eff),
)

/** f_d = f_B/N_sub: sub-converters share the symbols. f_B [Hz], N_sub [1] → [Hz]. */
export const subConverterRate = formula(
  { symbol: 'f_d', meaning: 'rate at which each sub-converter samples', unit: 'Hz', source: 'definition' },
  (f_B, N_sub) => f_B / N_sub,
)

/** Clock frequency of one decision circuit [Hz]: the receiver's clock, or that of a sub-converter. */
export function decisionRate({ settings, rates, t }: Bench): number {
  const { kind, converter } = settings.receiver
  return kind === 'converter' ? t.calc(subConverterRate, rates.f_B!, converter.sub_converters) : rates.f_ck
}

/** Symbol of {@link decisionRate}. */
export const decisionSymbol = ({ settings }: Bench): string =>
  settings.receiver.kind === 'converter' ? 'f_d' : 'f_ck'

/** T_d = 1/f_d. f_d [Hz] → [s]. */
export const decisionPeriod = formula(
  { symbol: 'T_d', meaning: 'clock period of the decision', unit: 's', source: 'definition' },
  (f_d) => 1 / f_d,
)

/** P = V_L/(A0 V_range) e^(−t/τ), at most 1; e^−690 stands for all that is less. V_L [V], A0 [1], V_range [V], t_reg [s], tau [s] → [1]. */
export const undecided = formula(
  {
    symbol: 'P_meta',
    meaning: 'probability that a sample spread over the range stays undecided',
    unit: '1',
    source: LATCH,
  },
  (V_L, A0, V_range, t_reg, tau) =>
    Math.min(1, (V_L / (A0 * V_range)) * Math.exp(-Math.min(690, t_reg / tau))),
)

/** P_max = share · BER. share [1], BER [1] → [1]. */
export const undecidedLimit = formula(
  {
    symbol: 'P_max',
    meaning: 'share of the error target that undecided edge samples may take',
    unit: '1',
    source: COMMON,
  },
  (share, BER) => share * BER,
)

/** How a trace is told of a constant. */
export const constant = (given: Constant, t: Trace): number => t.leaf(given, given.value)
