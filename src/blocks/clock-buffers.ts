import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { gateCapacitanceOf } from '../device/speed.ts'
import { halfDensity, tailVoltage } from '../device/stacks/lines.ts'
import { switchedPair } from '../device/stacks/switched-pair.ts'
import { SWITCH_FLOOR } from '../device/voltage.ts'
import type { Bench, Case } from './bench.ts'
import { deviceResults } from './design-point.ts'
import { layoutShare, loadFactor, peakingFactor } from './load.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import { stageSpeed } from './stage-speed.ts'
import { ASKED, notAsked, subBlock, type Unprepared } from './sub-block.ts'

const RESTORED =
  'derived: each limiting stage restores the tone, so it needs gain at the clock frequency, not the bandwidth of a cascade'

/** f_T ≥ 1.2 f_ck A ℓ/(β √(A² − 1)). f_ck [Hz], A [1] > 1, l [1], beta [1] → [Hz]. */
export const clockBufferDemand = formula(
  { symbol: 'f_T_req', meaning: 'device speed that a clock buffer needs', unit: 'Hz', source: RESTORED },
  (f_ck, A, l, beta) => (1.2 * f_ck * A * l) / (beta * Math.sqrt(A ** 2 - 1)),
)

/** Buffers behind an LC oscillator are ac-coupled unless the scenario says otherwise. */
function couplingOf({ clock, oscillator }: Case['settings']): 'dc' | 'ac' {
  if (clock.coupling !== 'by-use') return clock.coupling
  return oscillator?.kind === 'LC' ? 'ac' : 'dc'
}

function prepare(bench: Bench): Stacked | Unprepared {
  const { stack, settings, t, rates } = bench
  if (stack.missing !== undefined) return { unknown: stack.missing }
  const { device, V, V_high } = stack
  const { gain: A, fan_out } = settings.clock
  const V_sw = settings.headroom.clock_swing
  const V_tail = t.calc(tailVoltage, settings.headroom.tail, device.U_T)
  const beta = peakingFactor(settings.peaking.clock, t)
  const coupling = couplingOf(settings)
  const stage = switchedPair({
    device,
    V_sw,
    V_sw_in: V_sw,
    A,
    V_m: settings.headroom.reserve,
    V_tail,
    coupling,
    clockPairBelow: false,
    c_sat: t.leaf(SWITCH_FLOOR, SWITCH_FLOOR.value),
    ownSaturation: coupling === 'dc',
  })
  const demand = (J: number, trace: Trace): number => {
    const C_gg = gateCapacitanceOf(device, trace.calc(halfDensity, J), trace)
    const c_lay = trace.calc(layoutShare, device.of.C_lay, C_gg)
    const { m, d, w } = bench.node.shares
    return trace.calc(
      clockBufferDemand,
      rates.f_ck,
      A,
      trace.calc(loadFactor, fan_out, A, m, c_lay, d, w),
      beta,
    )
  }
  const rule = {
    key: 'clock_buffers',
    f_op: rates.f_ck,
    of: 'f_ck',
    k: settings.demand.multiples.clock_buffers,
    beta,
  }
  return { speed: stageSpeed({ stage, V, rule, demand }, t), V_S: V_tail, V_high }
}

/** CML buffers that carry the clock from the oscillator to its users. */
export const clockBuffers = subBlock<Stacked>({
  id: 'clock_buffers',
  title: 'CML clock buffers',
  of: ['link', 'clock'],
  asked: ({ settings }) =>
    settings.clock.style === 'CML' ? ASKED : notAsked('the clock is distributed full-swing'),
  prepare,
  checks: stackChecks('Clock buffers'),
  results: ({ speed, V_S }, bench) =>
    bench.stack.missing === undefined
      ? deviceResults('clock_buffers', speed, bench.stack.device, 0.5, V_S, bench)
      : [],
})
