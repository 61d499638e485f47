import type { Bench } from '../blocks/bench.ts'
import type { BudgetLines } from './budget/lines.ts'
import { SOURCE_NAMES } from './loop/line-jitter.ts'

/** What a random-jitter budget that is missed would take, in words. */

const CALLED = {
  reference: 'the reference',
  detector: 'the phase detector',
  divider: 'the divider',
  modulator: 'the modulator',
  oscillator: 'the oscillator',
  supply: "the oscillator's supply",
  filter: 'the loop filter',
} as const

/**
 * Names the largest source of a missed random-jitter budget and, when the oscillator is a ring, the power at which
 * its share would fit with everything else unchanged.
 */
export function whatItTakes(
  { loop, path }: BudgetLines,
  sigma: number,
  limit: number,
  { settings }: Bench,
): string {
  const largest = SOURCE_NAMES.reduce((most, one) => (loop.judged[one] > loop.judged[most] ? one : most))
  const others = sigma ** 2 - loop.judged.oscillator ** 2
  if (path.sigma > loop.judged[largest]) return 'the clock path makes most of it'
  if (largest !== 'oscillator') return `${CALLED[largest]} makes most of it`
  const room = limit ** 2 - others
  if (settings.oscillator?.kind === 'LC' || loop.sources.measured !== null || room <= 0) {
    return 'the oscillator makes most of it'
  }
  const power = (loop.sources.oscillator.power * loop.judged.oscillator ** 2) / room
  return `the ring makes most of it: at this bandwidth it would need ${(power * 1e3).toPrecision(2)} mW instead of ${(loop.sources.oscillator.power * 1e3).toPrecision(2)} mW`
}
