import { formula } from '../derivation/formula.ts'
import { marginOfCount } from '../derivation/margin.ts'
import type { Bench } from './bench.ts'
import type { CheckSpec, Outcome } from './sub-block.ts'

/** f_osc = k_ph f_ck. k_ph [1] oscillator periods a clock period, f_ck [Hz] → [Hz]. */
export const oscillatorFrequency = formula(
  {
    symbol: 'f_osc',
    meaning: 'frequency at which the oscillator must run for this lane',
    unit: 'Hz',
    source: 'definition',
  },
  (k_ph, f_ck) => k_ph * f_ck,
)

/** 1 when f_min ≤ f_osc ≤ f_max to a part in 10⁹, else 0. f_osc [Hz], f_min [Hz], f_max [Hz] → [1]. */
export const insideRange = formula(
  {
    symbol: 'available',
    meaning: 'whether the range holds that frequency: 1 yes, 0 no',
    unit: '1',
    source: 'definition',
  },
  (f_osc, f_min, f_max) => ((f_osc / f_min - 0.999999999) * (1.000000001 - f_osc / f_max) >= 0 ? 1 : 0),
)

const YES = { symbol: 'required', meaning: 'yes', unit: '1', source: 'definition' }
/** How many periods of the oscillator make one of the clock. */
export const PHASE_RATIO = {
  symbol: 'k_ph',
  meaning: 'oscillator periods a clock period',
  unit: '1',
  source: 'definition',
  path: 'clock.phases_from',
}

function coverOutcome(_: unknown, bench: Bench): Outcome {
  const { t, settings, rates, guard } = bench
  const [f_min, f_max] = settings.oscillator!.range
  const k_ph = t.leaf(PHASE_RATIO, settings.clock.phases_from === 'divide-by-2' ? 2 : 1)
  const f_osc = t.calc(oscillatorFrequency, k_ph, rates.f_ck)
  const required = t.leaf(YES, 1)
  const available = t.calc(insideRange, f_osc, f_min, f_max)
  return {
    required,
    available,
    margin: t.calc(marginOfCount, available, required, guard),
    basis: 'stated range of the oscillator',
    ...(available === 1 ? {} : { reason: `the lane's clock asks for ${(f_osc / 1e9).toPrecision(4)} GHz` }),
  }
}

/** Whether the oscillator's range holds the frequency that the lane's clock asks for. */
export function rangeCheck(title: string): CheckSpec<object> {
  return {
    name: 'range',
    title: `${title}: range holds the lane's clock`,
    quantity: 'range holds the clock',
    unit: '1',
    sense: 'at least',
    yesNo: true,
    asked: ({ block }) => block === 'link',
    evaluate: coverOutcome,
  }
}
