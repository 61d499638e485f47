import { marginOfProbability } from '../derivation/margin.ts'
import { saturationAt } from '../device/fixed-bias.ts'
import { efficiency, selfGain } from '../device/speed.ts'
import type { Bench, Case } from './bench.ts'
import { coreStressCheck } from './core-stress.ts'
import {
  constant,
  decisionPeriod,
  decisionRate,
  INTEGRATION_GAIN,
  LOGIC_LEVEL,
  undecided,
  undecidedLimit,
} from './decision.ts'
import { designDensity, deviceResults } from './design-point.ts'
import {
  type DynamicLatch,
  dynamicLatch,
  dynamicLatchSpeed,
  latchErrors,
  timeToRegenerate,
} from './dynamic-latch.ts'
import { type FlipFlop, flipFlop, flipFlopTime } from './flip-flop.ts'
import { regenerationOutcome } from './latch-gain.ts'
import { aboveClockPair } from './latch-stack.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import {
  ASKED,
  type CheckSpec,
  type NamedResult,
  type Outcome,
  subBlock,
  type Unprepared,
} from './sub-block.ts'

type Sampler = DynamicLatch | FlipFlop

function prepare(bench: Bench): Sampler | Unprepared {
  const { stack, settings } = bench
  const f_d = decisionRate(bench)
  if (settings.receiver.sampler === 'dynamic-latch') return dynamicLatch(bench, f_d)
  return stack.missing === undefined ? flipFlop(bench, stack, f_d) : { unknown: stack.missing }
}

const NEVER = {
  symbol: 'P_meta',
  meaning: 'the latch does not regenerate',
  unit: '1',
  source: 'law',
  value: 1,
}

/** Undecided edge samples against their share of the error target. */
function metastabilityOutcome(state: Sampler, bench: Bench): Outcome {
  const { settings, t } = bench
  const { error_ratio, receiver } = settings
  if (error_ratio === null) {
    const basis = 'not computed'
    return {
      required: null,
      available: null,
      margin: null,
      basis,
      reason: 'the scenario states no error_ratio',
    }
  }
  const required = t.calc(undecidedLimit, receiver.metastable_share, error_ratio)
  const T_d = t.calc(decisionPeriod, state.f_d)
  const V_range = receiver.linear_swing
  if ('speed' in state) {
    const tau = flipFlopTime(state, bench)
    const basis = 'both latches at the design point; edges spread over the linear swing'
    if (tau === null) {
      const available = constant(NEVER, t)
      const margin = t.calc(marginOfProbability, available, required)
      return {
        required,
        available,
        margin,
        basis,
        reason: 'the latch has no operating point that regenerates',
      }
    }
    const available = t.calc(undecided, state.V_sw, state.A, V_range, T_d, tau)
    return { required, available, margin: t.calc(marginOfProbability, available, required), basis }
  }
  const [V_L, A0] = [constant(LOGIC_LEVEL, t), constant(INTEGRATION_GAIN, t)]
  const t_reg = timeToRegenerate(state, T_d, t)
  const available = t.calc(undecided, V_L, A0, V_range, t_reg, state.tau)
  return {
    required,
    available,
    margin: t.calc(marginOfProbability, available, required),
    basis:
      'a clock period less integration, half of it in the latch that follows; edges spread over the linear swing',
    supply: bench.V_core,
  }
}

const isFlipFlop = ({ settings }: Case): boolean => settings.receiver.sampler === 'flip-flop'
const [SPEED, ...OTHERS] = stackChecks('Sampler')

const CHECKS: readonly CheckSpec<Sampler>[] = [
  {
    ...SPEED!,
    evaluate: (state, bench) =>
      'speed' in state ? SPEED!.evaluate(state, bench) : dynamicLatchSpeed(state, bench),
  },
  ...OTHERS.map((check) => ({
    ...check,
    asked: (given: Case) => isFlipFlop(given) && (check.asked?.(given) ?? true),
    evaluate: (state: Sampler, bench: Bench) => check.evaluate(state as Stacked, bench),
  })),
  {
    name: 'metastability',
    because: 'the scenario states no edge samplers',
    title: 'Sampler: metastability of edge samples',
    quantity: 'probability of an undecided sample',
    unit: '1',
    sense: 'at most',
    asked: ({ settings }) => settings.receiver.edge_samplers === 'yes',
    evaluate: metastabilityOutcome,
  },
  {
    name: 'regeneration',
    title: 'Sampler: regeneration',
    quantity: 'loop gain of the cross-coupled pair',
    unit: '1',
    sense: 'at least',
    asked: isFlipFlop,
    evaluate: (state, bench) => regenerationOutcome(state as FlipFlop, bench),
  },
  coreStressCheck('Sampler', (given) => !isFlipFlop(given)),
]

function results(state: Sampler, bench: Bench): readonly NamedResult[] {
  const { nmos, t, guard } = bench
  if ('speed' in state) {
    const point = designDensity(state.speed, guard)
    const V_pair = point === null ? state.V_S : aboveClockPair(state.device, point.J, state.V_S)
    return deviceResults('sampler', state.speed, state.device, 0.5, V_pair, bench)
  }
  const { bias, f_T, tau } = state
  const { offset, noise, W } = latchErrors(state, bench)
  const gm_ID = t.calc(efficiency, bias.g_m, bias.J)
  const named = (name: string, value: number, unit: string): NamedResult => ({ name, value, unit })
  return [
    named('device.sampler.fT_Hz', f_T, 'Hz'),
    named('device.sampler.IC', bias.IC, '1'),
    named('device.sampler.J_A_per_m', bias.J, 'A/m'),
    named('device.sampler.VGS_V', bias.V_GS, 'V'),
    named('device.sampler.VDSsat_V', saturationAt(nmos, bias, t), 'V'),
    named('device.sampler.gmOverId_per_V', gm_ID, '1/V'),
    named('device.sampler.selfGain', t.calc(selfGain, gm_ID, nmos.of.V_E, nmos.of.L), '1'),
    named('sampler.time_constant_s', tau, 's'),
    named('sampler.width_m', W, 'm'),
    named('sampler.offset_V', offset, 'V'),
    named('sampler.noise_V', noise, 'V'),
  ]
}

/** The decision circuit: a dynamic latch, or a flip-flop of current-mode latches. */
export const sampler = subBlock<Sampler>({
  id: 'sampler',
  title: 'Sampler',
  of: ['link'],
  asked: () => ASKED,
  prepare,
  checks: CHECKS,
  results,
})
