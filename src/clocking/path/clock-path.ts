import type { Bench } from '../../blocks/bench.ts'
import { clockPeriod } from '../../blocks/cmos-clock-buffers.ts'
import { peakingFactor } from '../../blocks/load.ts'
import { BOLTZMANN } from '../../device/conditions.ts'
import { gateJitter, gateOverdrive } from '../noise/edges.ts'
import type { Sources } from '../noise/sources.ts'
import { phaseErrorJitter, SENSITIVITY, supplyJitter } from './bounded.ts'
import {
  bufferCount,
  bufferCurrent,
  bufferDelay,
  bufferJitter,
  bufferLoad,
  bufferPole,
  limitingJitter,
  PHASE_DIVIDER,
  pathJitter,
  pathStages,
  RECEIVER_LOAD,
  REPEATER_GATES,
  repeaterDelay,
  sineJitter,
  sinePeak,
  spanLength,
} from './buffer-jitter.ts'

/** What the way from the oscillator to the users of the clock adds. SI. */
export interface ClockPath {
  /** Stages: buffers, and the divider that makes the phases. */
  readonly stages: number
  /** Load of each buffer [F]. */
  readonly C_L: number
  /** Random jitter of the whole path, rms [s]. */
  readonly sigma: number
  /** Jitter by supply ripple, peak to peak [s]. */
  readonly J_supply: number
  /** Even-odd jitter, peak to peak [s]. */
  readonly J_eo: number
  /** Clock period [s]. */
  readonly T_ck: number
  /** Tail current of a current-mode buffer [A]; null for full-swing ones. */
  readonly I_buf: number | null
}

/** Random and bounded jitter of the clock path, by its style. */
export function clockPathAt(bench: Bench, sources: Sources): ClockPath | { readonly unknown: string } {
  const { settings, t, node, rates, stack } = bench
  const { clock } = settings
  if (clock.style === 'CML' && stack.missing !== undefined) return { unknown: stack.missing }
  const n_buf = t.calc(bufferCount, clock.distance, clock.repeater_span)
  const n_div = t.leaf(PHASE_DIVIDER, clock.phases_from === 'divide-by-2' ? 1 : 0)
  const stages = t.calc(pathStages, n_buf, n_div)
  const l_each = t.calc(spanLength, clock.distance, n_buf)
  const C_in = t.leaf(RECEIVER_LOAD, RECEIVER_LOAD.value)
  const C_L = t.calc(bufferLoad, node.wire_capacitance, l_each, clock.fan_out, C_in)
  const T_ck = t.calc(clockPeriod, rates.f_ck)
  const stage = clock.style === 'CML' ? currentMode(bench, C_L) : fullSwing(bench, sources, C_L)
  const V = clock.style === 'CML' && stack.missing === undefined ? stack.V : bench.V_core
  return {
    stages,
    C_L,
    sigma: t.calc(pathJitter, stages, stage.sigma),
    J_supply: t.calc(supplyJitter, stages, stage.t_d, stage.S_V, clock.supply_ripple, V),
    J_eo: t.calc(phaseErrorJitter, clock.phase_error, T_ck),
    T_ck,
    I_buf: stage.I_buf,
  }
}

interface Stage {
  readonly sigma: number
  readonly t_d: number
  readonly S_V: number
  readonly I_buf: number | null
}

function currentMode(bench: Bench, C_L: number): Stage {
  const { settings, rates, at, nmos, t, guard } = bench
  const { gain: A } = settings.clock
  const V_sw = settings.headroom.clock_swing
  const { gamma } = nmos.of
  const f_p = t.calc(bufferPole, rates.f_ck, A, guard)
  const V_pk = t.calc(sinePeak, V_sw, rates.f_ck, f_p)
  const sigma = t.calc(
    bufferJitter,
    t.calc(limitingJitter, BOLTZMANN.value, at.T, gamma, A, C_L, f_p, V_sw),
    t.calc(sineJitter, BOLTZMANN.value, at.T, gamma, A, C_L, rates.f_ck, V_pk),
  )
  const S_V = t.leaf(SENSITIVITY.CML, SENSITIVITY.CML.value)
  const beta = peakingFactor(settings.peaking.clock, t)
  const I_buf = t.calc(bufferCurrent, f_p, C_L, V_sw, beta)
  return { sigma, t_d: t.calc(bufferDelay, f_p), S_V, I_buf }
}

function fullSwing({ nmos, V_core, at, t }: Bench, { FO4 }: Sources, C_L: number): Stage {
  const t_d = t.calc(repeaterDelay, t.leaf(REPEATER_GATES, REPEATER_GATES.value), FO4)
  const V_ov = t.calc(gateOverdrive, V_core, nmos.V_T, nmos.of.n, nmos.U_T)
  const sigma = t.calc(gateJitter, t_d, V_core, BOLTZMANN.value, at.T, nmos.of.gamma, V_ov, C_L)
  return { sigma, t_d, S_V: t.leaf(SENSITIVITY.CMOS, SENSITIVITY.CMOS.value), I_buf: null }
}
