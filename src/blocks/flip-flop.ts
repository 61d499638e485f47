import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import type { DeviceHere } from '../device/conditions.ts'
import { speedAt, transconductanceAt } from '../device/speed.ts'
import { halfDensity } from '../device/stacks/lines.ts'
import type { Bench, StackSupply } from './bench.ts'
import { decisionSymbol } from './decision.ts'
import { notedDesignDensity } from './design-point.ts'
import {
  CROSS_RATIO,
  crossDensity,
  crossGainAt,
  latchDemand,
  latchFactorOf,
  latchLoadAt,
} from './latch-load.ts'
import { latchStack } from './latch-stack.ts'
import { peakingFactor } from './load.ts'
import type { Stacked } from './stack-checks.ts'
import { stageSpeed } from './stage-speed.ts'

/** A flip-flop of two current-mode latches. */

/** f_in = 1.2 f_d: as a divider at a fifth more than its clock. f_d [Hz] → [Hz]. */
export const flipFlopRate = formula(
  {
    symbol: 'f_in',
    meaning: 'toggle rate that the latches must reach',
    unit: 'Hz',
    source: 'common practice, no source: a fifth above the clock',
  },
  (f_d) => 1.2 * f_d,
)

export const ONE_LATCH = {
  symbol: 'phi_o',
  meaning: 'a flip-flop drives one like latch',
  unit: '1',
  source: 'common practice, no source',
}

/** A flip-flop at an operating point. */
export interface FlipFlop extends Stacked {
  readonly device: DeviceHere
  readonly V_sw: number
  readonly A: number
  readonly phi_o: number
  readonly f_d: number
}

/** A flip-flop clocked at f_d [Hz]: two latches that must toggle at 1.2 f_d. */
export function flipFlop(
  bench: Bench,
  stack: Exclude<StackSupply, { missing: string }>,
  f_d: number,
): FlipFlop {
  const { settings, node, t } = bench
  const { device, V, V_high } = stack
  const A = settings.clock.gain
  const { stage, V_tail, V_sw, V_off } = latchStack(bench, device, settings.headroom.latch_swing, A, t)
  const beta = peakingFactor(settings.peaking.receive, t)
  const k_latch = latchFactorOf(t)
  const f_in = t.calc(flipFlopRate, f_d)
  const phi_o = t.leaf(ONE_LATCH, 1)
  const demand = (J: number, trace: Trace): number =>
    trace.calc(latchDemand, f_in, latchLoadAt(device, node.shares, A, phi_o, J, trace), k_latch, beta)
  const rule = {
    key: 'sampler',
    f_op: f_d,
    of: decisionSymbol(bench),
    k: settings.demand.multiples.sampler,
    beta,
  }
  return {
    speed: stageSpeed({ stage, V, rule, demand }, t),
    V_S: V_tail,
    V_off,
    V_high,
    device,
    V_sw,
    A,
    phi_o,
    f_d,
  }
}

/** τ = ℓ C_gg/(ρ g_mx (1 − 1/A_x)); without loop gain it never ends. l_latch [1], C_gg [F/m], rho_x [1], g_m [S/m] of the cross pair, A_cross [1] → [s]. */
export const latchRegeneration = formula(
  {
    symbol: 'tau',
    meaning: 'regeneration time constant of a current-mode latch',
    unit: 's',
    source: 'derived: C dv/dt = (g_m − 1/R) v at the cross-coupled pair',
  },
  (l_latch, C_gg, rho_x, g_m, A_cross) => (l_latch * C_gg) / (rho_x * g_m * (1 - 1 / A_cross)),
)

/** What the regeneration of a latch depends on beside its current per width. SI. */
export interface LatchBody {
  readonly device: DeviceHere
  readonly V_sw: number
  readonly A: number
  readonly phi_o: number
}

/** Regeneration time constant [s] at current per width J [A/m]; null without loop gain. */
export function latchTimeAt(
  { device, V_sw, A, phi_o }: LatchBody,
  J: number,
  shares: Bench['node']['shares'],
  t: Trace,
): number | null {
  const A_cross = crossGainAt(device, J, V_sw, t)
  if (A_cross <= 1) return null
  const rho_x = t.leaf(CROSS_RATIO, CROSS_RATIO.value)
  const g_m = transconductanceAt(device, t.calc(crossDensity, J, rho_x), t)
  const { C_gg } = speedAt(device, t.calc(halfDensity, J), t)
  return t.calc(latchRegeneration, latchLoadAt(device, shares, A, phi_o, J, t), C_gg, rho_x, g_m, A_cross)
}

/** Regeneration time constant [s] at the design point; null without an operating point or loop gain. */
export function flipFlopTime(state: FlipFlop, bench: Bench): number | null {
  const { t, node, guard } = bench
  const J = notedDesignDensity(state.speed, guard, t)
  return J === null ? null : latchTimeAt(state, J, node.shares, t)
}
