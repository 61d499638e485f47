import type { Bench } from '../blocks/bench.ts'
import { formula } from '../derivation/formula.ts'
import { BOLTZMANN } from '../device/conditions.ts'

/** Noise at a receiver's input. */

const REFERENCE_TEMPERATURE = {
  symbol: 'T_0',
  meaning: 'temperature that noise figures refer to',
  unit: 'K',
  source: 'IEEE Std 161: noise factor at 290 K',
  value: 290,
}

/** η_0 = k_B T_0 2R0 10^(NF/10): one-sided, across the matched differential load. k_B [J/K], T_0 [K], R0 [ohm], NF [dB] → [V²/Hz]. */
export const noiseDensity = formula(
  {
    symbol: 'eta_0',
    meaning: 'one-sided noise density at the input of the receiver',
    unit: 'V²/Hz',
    source: 'H. T. Friis, Proceedings of the IRE 32(7), 1944; law: available noise of a matched source',
  },
  (k_B, T_0, R0, NF) => k_B * T_0 * 2 * R0 * 10 ** (NF / 10),
)

/** One-sided noise density of a case [V²/Hz]: the stated one, else that of the noise figure. */
export function inputNoise({ settings, t }: Bench): number {
  const { density, figure } = settings.noise
  if (density !== null) return density
  const T_0 = t.leaf(REFERENCE_TEMPERATURE, REFERENCE_TEMPERATURE.value)
  return t.calc(noiseDensity, BOLTZMANN.value, T_0, settings.transmitter.termination, figure)
}
