import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { gateCapacitanceOf } from '../device/speed.ts'
import { halfDensity } from '../device/stacks/lines.ts'
import type { Bench } from './bench.ts'
import { designDensity, deviceResults } from './design-point.ts'
import { aboveClockPair, latchStack } from './latch-stack.ts'
import { layoutShare, legsLoad, peakingFactor, poleDemand } from './load.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import { stageSpeed } from './stage-speed.ts'
import { ASKED, notAsked, subBlock, type Unprepared } from './sub-block.ts'

const LEGS = {
  symbol: 'n_leg',
  meaning: 'data inputs of the last multiplexer, each with its drain on the output',
  unit: '1',
  source: 'definition',
  path: 'transmitter.multiplexer',
}

/** BW = 0.35/(0.6 UI): an edge from 10 to 90 % within 0.6 UI. UI [s] → [Hz]. */
export const edgeBandwidth = formula(
  {
    symbol: 'BW',
    meaning: 'bandwidth that keeps the edges within 0.6 of the unit interval',
    unit: 'Hz',
    source:
      'rise time times bandwidth 0.35: H. W. Johnson & M. Graham, High-Speed Digital Design, 1993; 0.6 UI common practice, no source',
  },
  (UI) => 0.35 / (0.6 * UI),
)

/** k = k_mux φ. k_mux [1] for unit fan-out, phi [1] → [1]. */
export const multiplexerMultiple = formula(
  {
    symbol: 'k',
    meaning: 'device speed over symbol rate by the rule of thumb',
    unit: '1',
    source: 'common practice, no source',
  },
  (k_mux, phi) => k_mux * phi,
)

function prepare(bench: Bench): Stacked | Unprepared {
  const { stack, settings, node, rates, t } = bench
  if (stack.missing !== undefined) return { unknown: stack.missing }
  const { device, V, V_high } = stack
  const { multiplexer, multiplexer_fan_out: phi } = settings.transmitter
  const { multiplexer_2, multiplexer_4 } = settings.demand.multiples
  const A = settings.clock.gain
  const { stage, V_tail, V_off } = latchStack(bench, device, settings.headroom.clock_swing, A, t)
  const beta = peakingFactor(settings.peaking.transmit, t)
  const n_leg = t.leaf(LEGS, multiplexer === '2:1' ? 2 : 4)
  const BW = t.calc(edgeBandwidth, rates.UI!)
  const { m, d, w } = node.shares
  const demand = (J: number, trace: Trace): number => {
    const C_gg = gateCapacitanceOf(device, trace.calc(halfDensity, J), trace)
    const c_lay = trace.calc(layoutShare, device.of.C_lay, C_gg)
    return trace.calc(poleDemand, BW, A, trace.calc(legsLoad, phi, A, m, c_lay, n_leg, d, w), beta)
  }
  const k = t.calc(multiplexerMultiple, multiplexer === '2:1' ? multiplexer_2 : multiplexer_4, phi)
  const rule = { key: 'multiplexer', f_op: rates.f_B!, of: 'f_B', k, beta }
  return { speed: stageSpeed({ stage, V, rule, demand }, t), V_S: V_tail, V_high, V_off }
}

/** The last multiplexer of a current-mode transmitter. A source-series driver is fed by CMOS gates, judged with it. */
export const multiplexer = subBlock<Stacked>({
  id: 'multiplexer',
  title: 'Output multiplexer',
  of: ['link'],
  asked: ({ settings }) =>
    settings.transmitter.kind === 'current-mode'
      ? ASKED
      : notAsked('CMOS gates multiplex in front of a source-series driver; they are judged with the driver'),
  prepare,
  checks: stackChecks('Output multiplexer'),
  results: ({ speed, V_S }, bench) => {
    const { stack } = bench
    if (stack.missing !== undefined) return []
    const point = designDensity(speed, bench.guard)
    const V_pair = point === null ? V_S : aboveClockPair(stack.device, point.J, V_S)
    return deviceResults('multiplexer', speed, stack.device, 0.5, V_pair, bench)
  },
})
