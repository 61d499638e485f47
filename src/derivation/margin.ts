import { formula } from './formula.ts'

const METHOD = 'method of this planner: 1.00 is break-even'

/** margin = available/required, for "at least" checks. available, required [any, the same] → [1]. */
export const marginAtLeast = formula(
  { symbol: 'margin', meaning: 'available over required', unit: '1', source: METHOD },
  (available, required) => available / required,
)

/** margin = limit/actual, for "at most" checks; a limit that nothing is used of counts as a million. required [any] the limit, available [the same] the actual → [1]. */
export const marginAtMost = formula(
  { symbol: 'margin', meaning: 'limit over actual', unit: '1', source: METHOD },
  (required, available) => required / Math.max(available, required / 1e6),
)

/** margin = 10^(Δ/20), Δ positive when better. available [dB], required [dB] → [1]. */
export const marginInDecibel = formula(
  { symbol: 'margin', meaning: 'decibels to spare as a ratio', unit: '1', source: METHOD },
  (available, required) => 10 ** ((available - required) / 20),
)

/** margin = ln(actual)/ln(limit), for probabilities. available [1] the actual, required [1] the limit, both below 1 → [1]. */
export const marginOfProbability = formula(
  {
    symbol: 'margin',
    meaning: 'logarithm of the actual probability over that of the limit',
    unit: '1',
    source: METHOD,
  },
  (available, required) => Math.log(available) / Math.log(required),
)

/** margin = 1 + guard for a yes, 0 for a no. available [1], required [1], guard [1] → [1]. */
export const marginOfCount = formula(
  { symbol: 'margin', meaning: '1 + guard when enough, 0 when not', unit: '1', source: METHOD },
  (available, required, guard) => (available >= required ? 1 + guard : 0),
)
