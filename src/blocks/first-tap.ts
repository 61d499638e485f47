import { marginAtLeast } from '../derivation/margin.ts'
import type { Trace } from '../derivation/trace.ts'
import type { FixedBias } from '../device/fixed-bias.ts'
import { gateCapacitanceOf } from '../device/speed.ts'
import { halfDensity } from '../device/stacks/lines.ts'
import type { Bench, Case, StackSupply } from './bench.ts'
import { designDensity, deviceResults } from './design-point.ts'
import { latchBias } from './dynamic-latch.ts'
import { dataSlicers, type LoopDemand, loopDemand } from './feedback-loop.ts'
import { latchConstant, ONE_LATCH } from './flip-flop.ts'
import { type Latches, regenerationOutcome } from './latch-gain.ts'
import { latchFactorOf, latchLoadAt } from './latch-load.ts'
import { aboveClockPair, latchStack } from './latch-stack.ts'
import { layoutShare, peakingFactor } from './load.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import { combineRoutes, type Rule, ruleRoute, stageSpeed } from './stage-speed.ts'
import {
  ASKED,
  type CheckSpec,
  type NamedResult,
  notAsked,
  type Outcome,
  subBlock,
  type Unprepared,
} from './sub-block.ts'

type CurrentModeLoop = Latches
interface DynamicLoop {
  readonly bias: FixedBias
  readonly loop: LoopDemand
  readonly rule: Rule
}
type Loop = CurrentModeLoop | DynamicLoop

function prepare(bench: Bench): Loop | Unprepared {
  const { stack, settings } = bench
  const loop = loopDemand(bench)
  const rule = ruleOf(bench)
  if (settings.receiver.sampler === 'dynamic-latch') return { bias: latchBias(bench), loop, rule }
  return stack.missing === undefined ? currentModeLoop(bench, stack, loop, rule) : { unknown: stack.missing }
}

/** A dynamic slicer raises the multiple only where it decides inside the loop. */
function ruleOf({ settings, rates, t }: Bench): Rule {
  const { first_tap, first_tap_dynamic } = settings.demand.multiples
  const { sampler, dfe } = settings.receiver
  const slow = sampler === 'dynamic-latch' && dfe === 'direct'
  const beta = peakingFactor(settings.peaking.receive, t)
  return { key: 'first_tap', f_op: rates.f_B!, of: 'f_B', k: slow ? first_tap_dynamic : first_tap, beta }
}

function currentModeLoop(
  bench: Bench,
  { device, V, V_high }: Exclude<StackSupply, { missing: string }>,
  loop: LoopDemand,
  rule: Rule,
): CurrentModeLoop {
  const { settings, t, node } = bench
  const { stage, V_tail, V_off } = latchStack(
    bench,
    device,
    settings.headroom.latch_swing,
    settings.clock.gain,
    t,
  )
  const V_sw = settings.headroom.latch_swing
  const phi_o = t.leaf(ONE_LATCH, 1)
  const beta = peakingFactor(settings.peaking.receive, t)
  const k_latch = latchFactorOf(t)
  const demand = (J: number, trace: Trace): number => {
    const C_gg = gateCapacitanceOf(device, trace.calc(halfDensity, J), trace)
    const load = latchLoadAt(device, node.shares, settings.clock.gain, phi_o, J, trace)
    const kappa = trace.calc(latchConstant, load, k_latch, beta)
    return loop(trace.calc(layoutShare, device.of.C_lay, C_gg), trace, kappa)
  }
  return { speed: stageSpeed({ stage, V, rule, demand }, t), V_S: V_tail, V_high, V_off, device, V_sw }
}

function dynamicSpeed({ bias, loop, rule }: DynamicLoop, bench: Bench): Outcome {
  const { t, nmos, V_core } = bench
  const required = loop(t.calc(layoutShare, nmos.of.C_lay, bias.C_gg), t)
  const available = bias.f_T_int
  const derived = { required, available, margin: t.calc(marginAtLeast, available, required) }
  const bound = 'the gate voltage of the latch'
  return { ...combineRoutes(ruleRoute(rule, bench), derived, bench, bound), supply: V_core }
}

const isCurrentMode = ({ settings }: Case): boolean => settings.receiver.sampler === 'flip-flop'
const [SPEED, ...OTHERS] = stackChecks('First feedback tap')

const CHECKS: readonly CheckSpec<Loop>[] = [
  {
    ...SPEED!,
    evaluate: (state, bench) =>
      'speed' in state ? SPEED!.evaluate(state, bench) : dynamicSpeed(state, bench),
  },
  ...OTHERS.map((check) => ({
    ...check,
    asked: (given: Case) => isCurrentMode(given) && (check.asked?.(given) ?? true),
    evaluate: (state: Loop, bench: Bench) => check.evaluate(state as Stacked, bench),
  })),
  {
    name: 'regeneration',
    title: 'First feedback tap: regeneration',
    quantity: 'loop gain of the cross-coupled pair',
    unit: '1',
    sense: 'at least',
    asked: isCurrentMode,
    evaluate: (state, bench) => regenerationOutcome(state as Latches, bench),
  },
]

function results(state: Loop, bench: Bench): readonly NamedResult[] {
  const { rates, settings, guard } = bench
  const slicers = dataSlicers(rates.levels, settings.receiver.dfe === 'unrolled')
  const counted = [
    { name: 'first_tap.data_slicers', value: slicers, unit: '1' },
    { name: 'first_tap.error_slicers', value: 1, unit: '1' },
  ]
  if (!('speed' in state)) {
    return [{ name: 'device.first_tap.fT_Hz', value: state.bias.f_T_int, unit: 'Hz' }, ...counted]
  }
  const point = designDensity(state.speed, guard)
  const V_pair = point === null ? state.V_S : aboveClockPair(state.device, point.J, state.V_S)
  return [...deviceResults('first_tap', state.speed, state.device, 0.5, V_pair, bench), ...counted]
}

/** The first decision-feedback tap, whose loop closes within one unit interval. */
export const firstTap = subBlock<Loop>({
  id: 'first_tap',
  title: 'First feedback tap',
  of: ['link'],
  asked: ({ settings: { receiver } }) => {
    if (receiver.kind === 'converter') return notAsked('a converter-based receiver feeds back digitally')
    return receiver.dfe_taps > 0 ? ASKED : notAsked('the receiver has no decision feedback')
  },
  prepare,
  checks: CHECKS,
  results,
})
