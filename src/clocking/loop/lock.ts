import type { Bench } from '../../blocks/bench.ts'
import type { ClockLoop } from './clock-loop.ts'
import { filterPartsOf } from './filter-parts.ts'
import {
  COUNT,
  FIRST_ORDER,
  frequencyError,
  lockTime,
  realignedLockTime,
  searchTime,
  settlingTime,
  slewTime,
  slowestPole,
} from './lock-time.ts'

/** Estimated time to lock [s]: search among bands, charging of the filter, settling. */
export function lockTimeOf(loop: ClockLoop, bench: Bench): number {
  const { t, settings } = bench
  const { reference, lock_tolerance, tuning_voltage, charge_pump_current } = settings.loop!
  const [f_min, f_max] = settings.oscillator!.range
  const { sources, f_c, r } = loop
  const { K_V, oscillator } = sources
  const t_search = t.calc(
    searchTime,
    t.leaf(COUNT, COUNT.value),
    f_min,
    f_max,
    K_V,
    tuning_voltage,
    reference,
  )
  const df_0 = t.calc(frequencyError, K_V, tuning_voltage)
  const parts = filterPartsOf(loop, bench)
  const p_slow = parts === null ? t.leaf(FIRST_ORDER, FIRST_ORDER.value) : t.calc(slowestPole, r)
  const t_settle = t.calc(settlingTime, df_0, lock_tolerance, oscillator.f_0, f_c, p_slow)
  if (parts === null) return t.calc(realignedLockTime, t_search, t_settle)
  const t_slew = t.calc(slewTime, df_0, parts.C_sum, charge_pump_current, K_V)
  return t.calc(lockTime, t_search, t_slew, t_settle)
}
