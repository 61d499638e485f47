import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { gateCapacitanceOf } from '../device/speed.ts'
import { halfDensity } from '../device/stacks/lines.ts'
import type { Bench } from './bench.ts'
import { designDensity, deviceResults } from './design-point.ts'
import { aboveClockPair, latchStack } from './latch-stack.ts'
import { layoutShare, legsLoad, peakingFactor } from './load.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import { stageSpeed } from './stage-speed.ts'
import { ASKED, notAsked, subBlock, type Unprepared } from './sub-block.ts'

const LEGS = {
  symbol: 'n_leg',
  meaning: 'phases that meet on one load: both polarities of two in quadrature',
  unit: '1',
  source: 'definition',
  value: 4,
}

/** f_T ≥ f_ck A ℓ/β. f_ck [Hz], A [1], l [1], beta [1] → [Hz]. */
export const interpolatorDemand = formula(
  {
    symbol: 'f_T_req',
    meaning: 'device speed that the interpolator needs',
    unit: 'Hz',
    source:
      'derived: its pole lies at the clock frequency, so that phases 90° apart overlap and the next buffer restores the tone',
  },
  (f_ck, A, l, beta) => (f_ck * A * l) / beta,
)

function prepare(bench: Bench): Stacked | Unprepared {
  const { stack, settings, node, rates, t } = bench
  if (stack.missing !== undefined) return { unknown: stack.missing }
  const { device, V, V_high } = stack
  const { gain: A, fan_out } = settings.clock
  const { stage, V_tail, V_off } = latchStack(bench, device, settings.headroom.clock_swing, A, t)
  const beta = peakingFactor(settings.peaking.clock, t)
  const n_leg = t.leaf(LEGS, LEGS.value)
  const { m, d, w } = node.shares
  const demand = (J: number, trace: Trace): number => {
    const C_gg = gateCapacitanceOf(device, trace.calc(halfDensity, J), trace)
    const c_lay = trace.calc(layoutShare, device.of.C_lay, C_gg)
    const load = trace.calc(legsLoad, fan_out, A, m, c_lay, n_leg, d, w)
    return trace.calc(interpolatorDemand, rates.f_ck, A, load, beta)
  }
  const rule = {
    key: 'interpolator',
    f_op: rates.f_ck,
    of: 'f_ck',
    k: settings.demand.multiples.interpolator,
    beta,
  }
  return { speed: stageSpeed({ stage, V, rule, demand }, t), V_S: V_tail, V_high, V_off }
}

/** The phase interpolator that places the sampling clock. */
export const interpolator = subBlock<Stacked>({
  id: 'interpolator',
  title: 'Phase interpolator',
  of: ['link'],
  asked: ({ settings }) =>
    settings.receiver.interpolator === 'yes'
      ? ASKED
      : notAsked('the receiver places its clock without interpolators'),
  prepare,
  checks: stackChecks('Phase interpolator'),
  results: ({ speed, V_S }, bench) => {
    const { stack } = bench
    if (stack.missing !== undefined) return []
    const point = designDensity(speed, bench.guard)
    const V_pair = point === null ? V_S : aboveClockPair(stack.device, point.J, V_S)
    return deviceResults('interpolator', speed, stack.device, 0.5, V_pair, bench)
  },
})
