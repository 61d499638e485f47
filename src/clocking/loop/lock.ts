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

/** Time to lock by part [s]. */
export interface LockTime {
  readonly search: number
  readonly slew: number
  readonly settle: number
  readonly total: number
}

/** Estimated time to lock [s]: search among bands, charging of the filter, settling. */
export const lockTimeOf = (loop: ClockLoop, bench: Bench): number => lockTimesOf(loop, bench).total

/**
 * The bandwidth at which a type-II loop locks in a time [Hz]: settling goes with its inverse, the charge of the filter
 * with its square.
 *
 * @returns null when the search among bands alone takes that long
 */
export function bandwidthToLock(
  { search, slew, settle }: LockTime,
  f_c: number,
  within: number,
): number | null {
  const left = within - search
  if (left <= 0) return null
  const widest = Math.hypot(settle, 2 * Math.sqrt(slew * left))
  return (f_c * (settle + widest)) / (2 * left)
}

/** The parts of the time to lock. */
export function lockTimesOf(loop: ClockLoop, bench: Bench): LockTime {
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
  if (parts === null) {
    const total = t.calc(realignedLockTime, t_search, t_settle)
    return { search: t_search, slew: 0, settle: t_settle, total }
  }
  const t_slew = t.calc(slewTime, df_0, parts.C_sum, charge_pump_current, K_V)
  const total = t.calc(lockTime, t_search, t_slew, t_settle)
  return { search: t_search, slew: t_slew, settle: t_settle, total }
}
