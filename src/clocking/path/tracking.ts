import type { Bench } from '../../blocks/bench.ts'
import { formula } from '../../derivation/formula.ts'
import { PRESET_TABLE } from '../budget/presets.ts'

/** f_CDR = f_B/1667. f_B [Hz], n_CDR [1] → [Hz]. */
export const scaledCorner = formula(
  {
    symbol: 'f_CDR',
    meaning: 'corner below which the receiver tracks jitter',
    unit: 'Hz',
    source: 'INCITS MJSQ, TR-35-2004; OIF-CEI, clause 2',
  },
  (f_B, n_CDR) => f_B / n_CDR,
)

const SCALE = {
  symbol: 'n_CDR',
  meaning: 'symbol rate over the tracking corner',
  unit: '1',
  source: 'INCITS MJSQ, TR-35-2004',
  value: 1667,
}
const corner = (value: number, source: string) => ({
  symbol: 'f_CDR',
  meaning: 'corner below which the receiver tracks jitter',
  unit: 'Hz',
  source,
  value,
})
const PAM4 = corner(4e6, 'IEEE 802.3bs/cd/ck, PAM-4 lanes')
const FAST = corner(10e6, 'IEEE 802.3bj, lanes of 25 GBd in PAM-2')

/** From this symbol rate on, lanes in PAM-2 are tracked at a fixed corner [Bd]. */
const FAST_RATE = 20e9

/** Corner of the receiver's tracking [Hz]: the scenario's, the preset's, or that of its modulation; null for a clock without either. */
export function trackingCorner({ block, settings, rates, t }: Bench): number | null {
  const budget = settings.jitter_budget
  if (budget?.tracking != null) return budget.tracking
  if (block === 'clock') {
    const tracking = budget?.preset == null ? null : PRESET_TABLE[budget.preset].tracking
    return tracking === null ? null : t.leaf(corner(tracking, PRESET_TABLE[budget!.preset!].clause), tracking)
  }
  const f_B = rates.f_B!
  if (budget?.preset != null) {
    const { tracking, clause } = PRESET_TABLE[budget.preset]
    if (tracking !== null) return t.leaf(corner(tracking, clause), tracking)
  } else {
    if (settings.modulation !== 'PAM-2') return t.leaf(PAM4, PAM4.value)
    if (f_B >= FAST_RATE) return t.leaf(FAST, FAST.value)
  }
  return t.calc(scaledCorner, f_B, t.leaf(SCALE, SCALE.value))
}
