import { formula } from '../derivation/formula.ts'
import { marginAtLeast } from '../derivation/margin.ts'
import { deviceAt, typicalPoint } from '../device/conditions.ts'
import { fo4At } from '../device/fo4.ts'
import type { Bench } from './bench.ts'
import { coreStressCheck } from './core-stress.ts'
import { ASKED, notAsked, type Outcome, subBlock } from './sub-block.ts'

/** T_min = N_FO4 FO4: a shorter period no longer reaches full swing. N_FO4 [1], FO4_here [s] → [s]. */
export const shortestPeriod = formula(
  {
    symbol: 'T_min',
    meaning: 'shortest clock period that full-swing buffers carry',
    unit: 's',
    source: 'common practice, no source: 6 to 8 fan-out-of-four delays',
  },
  (N_FO4, FO4_here) => N_FO4 * FO4_here,
)

/** T_ck = 1/f_ck. f_ck [Hz] → [s]. */
export const clockPeriod = formula(
  { symbol: 'T_ck', meaning: 'clock period', unit: 's', source: 'definition' },
  (f_ck) => 1 / f_ck,
)

/** Full-swing buffers by the fan-out-of-four delay at their operating point [s]. */
interface FullSwing {
  readonly delay: number
}

const TYPICAL_300K = typicalPoint(300)

function prepare({ node, nmos, V_core, t }: Bench): FullSwing {
  return { delay: fo4At(node, nmos, deviceAt(node.nmos, TYPICAL_300K, t), V_core, t) }
}

function periodOutcome({ delay }: FullSwing, { settings, rates, V_core, t }: Bench): Outcome {
  const required = t.calc(shortestPeriod, settings.clock.cmos_period, delay)
  const available = t.calc(clockPeriod, rates.f_ck)
  return {
    required,
    available,
    margin: t.calc(marginAtLeast, available, required),
    basis: "fan-out-of-four delay of the node's devices at the lowest core supply",
    supply: V_core,
  }
}

/** Full-swing CMOS buffers that carry the clock from the oscillator to its users. */
export const cmosClockBuffers = subBlock<FullSwing>({
  id: 'cmos_clock_buffers',
  title: 'Full-swing CMOS clock buffers',
  of: ['link', 'clock'],
  asked: ({ settings }) =>
    settings.clock.style === 'CMOS' ? ASKED : notAsked('the clock is distributed in current mode'),
  prepare,
  checks: [
    {
      name: 'period',
      title: 'Full-swing clock buffers: clock period',
      quantity: 'clock period',
      unit: 's',
      sense: 'at least',
      evaluate: periodOutcome,
    },
    coreStressCheck('Full-swing clock buffers'),
  ],
  results: ({ delay }) => [{ name: 'cmos_clock_buffers.fo4_s', value: delay, unit: 's' }],
})
