import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import type { DeviceHere } from '../device/conditions.ts'
import type { Bench, StackSupply } from './bench.ts'
import { decisionSymbol } from './decision.ts'
import { notedDesignDensity } from './design-point.ts'
import { crossGainAt, latchDemand, latchFactorOf, latchLoadAt } from './latch-load.ts'
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

/** κ_int = 2ℓ/(k β): a ring of two latches that divides f_in turns at ω = πf_in = 1/τ. l_latch [1], k_latch [1], beta [1] → [1]. */
export const latchConstant = formula(
  {
    symbol: 'kappa_int',
    meaning: 'time constant of a current-mode latch in transit times of its device',
    unit: '1',
    source: 'derived: the same latches divide f_in, so each turns the phase by a quarter at half of it',
  },
  (l_latch, k_latch, beta) => (2 * l_latch) / (k_latch * beta),
)

/** τ = κ_int/(2πf_T). kappa_int [1], f_T [Hz] → [s]. */
export const latchTime = formula(
  {
    symbol: 'tau',
    meaning: 'regeneration time constant of a current-mode latch',
    unit: 's',
    source: 'definition',
  },
  (kappa_int, f_T) => kappa_int / (2 * Math.PI * f_T),
)

/** Regeneration time constant [s] at the design point; null without an operating point or loop gain. */
export function flipFlopTime(state: FlipFlop, bench: Bench): number | null {
  const { speed, device, V_sw, A, phi_o } = state
  const { t, node, guard, settings } = bench
  const J = notedDesignDensity(speed, guard, t)
  if (J === null || crossGainAt(device, J, V_sw, t) <= 1) return null
  const load = latchLoadAt(device, node.shares, A, phi_o, J, t)
  const beta = peakingFactor(settings.peaking.receive, t)
  return t.calc(latchTime, t.calc(latchConstant, load, latchFactorOf(t), beta), speed.stage.speed(J, t))
}
