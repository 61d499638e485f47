import type { Trace } from '../derivation/trace.ts'
import type { DeviceHere } from '../device/conditions.ts'
import type { Bench, Case } from './bench.ts'
import { designDensity, deviceResults } from './design-point.ts'
import { regenerationOutcome } from './latch-gain.ts'
import { latchDemand, latchFactorOf, latchLoadAt } from './latch-load.ts'
import { aboveClockPair, latchStack } from './latch-stack.ts'
import { peakingFactor } from './load.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import { stageSpeed } from './stage-speed.ts'
import { ASKED, type CheckSpec, notAsked, subBlock, type Unprepared } from './sub-block.ts'

interface Divider extends Stacked {
  readonly device: DeviceHere
  readonly V_sw: number
}

function prepare(bench: Bench): Divider | Unprepared {
  const { stack, settings, node, t } = bench
  const { kind, fan_out } = settings.divider
  if (kind !== 'static') return { unknown: `no model of ${kind} dividers in this release` }
  if (stack.missing !== undefined) return { unknown: stack.missing }
  const { device, V, V_high } = stack
  const f_osc = settings.oscillator!.range[1]
  const A = settings.clock.gain
  const { stage, V_tail, V_sw, V_off } = latchStack(bench, device, settings.headroom.latch_swing, A, t)
  const beta = peakingFactor(settings.peaking.clock, t)
  const k_latch = latchFactorOf(t)
  const demand = (J: number, trace: Trace): number =>
    trace.calc(latchDemand, f_osc, latchLoadAt(device, node.shares, A, fan_out, J, trace), k_latch, beta)
  const rule = { key: 'divider', f_op: f_osc, of: 'f_max', k: settings.demand.multiples.divider, beta }
  return { speed: stageSpeed({ stage, V, rule, demand }, t), V_S: V_tail, V_high, V_off, device, V_sw }
}

const isStatic = ({ settings }: Case): boolean => settings.divider.kind === 'static'
const [SPEED, ...OTHERS] = stackChecks('First divider')

const CHECKS: readonly CheckSpec<Divider>[] = [
  SPEED!,
  ...OTHERS.map((check) => ({
    ...check,
    asked: (given: Case) => isStatic(given) && (check.asked?.(given) ?? true),
  })),
  {
    name: 'regeneration',
    title: 'First divider: regeneration',
    quantity: 'loop gain of the cross-coupled pair',
    unit: '1',
    sense: 'at least',
    asked: isStatic,
    evaluate: regenerationOutcome,
  },
]

/** The first divider after the oscillator: two current-mode latches in a ring. Other kinds have no model. */
export const divider = subBlock<Divider>({
  id: 'divider',
  title: 'First divider',
  of: ['link', 'clock'],
  asked: ({ settings: { oscillator, divider } }) => {
    if (oscillator === null) return notAsked('the scenario states no oscillator')
    return divider.kind === 'none' ? notAsked('no divider follows the oscillator') : ASKED
  },
  prepare,
  checks: CHECKS,
  results: ({ speed, device, V_S }, bench) => {
    const point = designDensity(speed, bench.guard)
    const V_pair = point === null ? V_S : aboveClockPair(device, point.J, V_S)
    return deviceResults('divider', speed, device, 0.5, V_pair, bench)
  },
})
