import type { Bench } from '../../blocks/bench.ts'
import { formula } from '../../derivation/formula.ts'

/** K_V = k_V f_0. k_V [1/V], f_0 [Hz] → [Hz/V]. */
export const tuningOf = formula(
  { symbol: 'K_V', meaning: 'tuning gain of the oscillator', unit: 'Hz/V', source: 'definition' },
  (k_V, f_0) => k_V * f_0,
)

const about = (kind: string, value: number) => ({
  symbol: 'k_V',
  meaning: `tuning gain of ${kind} over its frequency`,
  unit: '1/V',
  source: 'common practice, no source',
  value,
})
const TUNING = { LC: about('an LC oscillator with a switched bank', 0.007), ring: about('a ring', 0.3) }

/** Tuning gain [Hz/V] of the oscillator: the scenario's, or by its kind at its frequency f_0 [Hz]. */
export function tuningGain({ settings, t }: Bench, f_0: number): number {
  const { oscillator, loop } = settings
  if (loop!.tuning_gain !== null) return loop!.tuning_gain
  const kind = TUNING[oscillator!.kind === 'LC' ? 'LC' : 'ring']
  return t.calc(tuningOf, t.leaf(kind, kind.value), f_0)
}
