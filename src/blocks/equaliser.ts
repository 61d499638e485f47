import { formula } from '../derivation/formula.ts'
import { marginAtLeast } from '../derivation/margin.ts'
import type { Trace } from '../derivation/trace.ts'
import type { DeviceHere } from '../device/conditions.ts'
import { saturationAt } from '../device/fixed-bias.ts'
import { efficiency, gateCapacitanceOf, selfGain, transconductanceAt } from '../device/speed.ts'
import { linearPair, linearSwing, peakInput } from '../device/stacks/linear-pair.ts'
import { tailVoltage } from '../device/stacks/lines.ts'
import type { Bench, StackSupply } from './bench.ts'
import { wholeSupplyOutcome } from './core-stress.ts'
import { dataBandwidth } from './current-mode-driver.ts'
import { deviceResults, notedDesignDensity } from './design-point.ts'
import {
  type InverterChain,
  inverterChain,
  inverterGain,
  inverterHeadroom,
  inverterSpeed,
} from './inverter-chain.ts'
import {
  boostOutcome,
  chainDemand,
  type LinearChain,
  linearChain,
  linearShare,
  lowFrequencyGain,
} from './linear-chain.ts'
import { layoutShare, loadFactor } from './load.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import { derivedRoute, stageSpeed } from './stage-speed.ts'
import {
  ASKED,
  type CheckSpec,
  type NamedResult,
  type Outcome,
  subBlock,
  type Unprepared,
} from './sub-block.ts'

interface PairChain extends Stacked {
  readonly chain: LinearChain
  readonly device: DeviceHere
}
type Equaliser = PairChain | InverterChain

function prepare(bench: Bench): Equaliser | Unprepared {
  const { stack, settings } = bench
  if (settings.receiver.equaliser === 'complementary') return inverterChain(bench)
  return stack.missing === undefined ? pairChain(bench, stack) : { unknown: stack.missing }
}

function pairChain(
  bench: Bench,
  { device, V, V_high }: Exclude<StackSupply, { missing: string }>,
): PairChain {
  const { settings, node, rates, t } = bench
  const { receiver, headroom } = settings
  const chain = linearChain(settings, t)
  const { A, beta, shrink } = chain
  const V_lin = receiver.linear_swing
  const V_tail = t.calc(tailVoltage, headroom.tail, device.U_T)
  const eta = linearShare(chain.degeneration, t)
  const stage = linearPair({
    device,
    V_sw: t.calc(linearSwing, headroom.data_swing, V_lin, eta),
    V_lin,
    // What boost flattens is largest where the gain is lowest.
    V_pk: t.calc(peakInput, V_lin, t.calc(lowFrequencyGain, A, chain.degeneration)),
    A,
    V_tail,
  })
  const f_N = rates.f_N!
  const BW = t.calc(dataBandwidth, receiver.bandwidth_factor, f_N)
  const { m, d, w } = node.shares
  const demand = (J: number, trace: Trace): number => {
    const c_lay = trace.calc(layoutShare, device.of.C_lay, gateCapacitanceOf(device, J, trace))
    const load = trace.calc(loadFactor, receiver.fan_out, A, m, c_lay, d, w)
    return trace.calc(chainDemand, BW, A, load, beta, shrink)
  }
  const rule = { key: 'equaliser', f_op: f_N, of: 'f_N', k: settings.demand.multiples.equaliser, beta }
  return { speed: stageSpeed({ stage, V, rule, demand }, t), V_S: V_tail, V_high, chain, device }
}

/** A_0 ≥ 2A: half the self-gain is left to the load. A [1] → [1]. */
export const neededSelfGain = formula(
  {
    symbol: 'A_0_req',
    meaning: 'self-gain that leaves the load in charge of the gain',
    unit: '1',
    source: 'common practice, no source: with twice the gain the output conductance takes a third of it',
  },
  (A) => 2 * A,
)

function selfGainOutcome(state: Equaliser, bench: Bench): Outcome {
  const { t } = bench
  const required = t.calc(neededSelfGain, state.chain.A)
  if (!('speed' in state)) {
    const available = inverterGain(state, bench)
    const margin = t.calc(marginAtLeast, available, required)
    return {
      required,
      available,
      margin,
      basis: 'both devices at half the supply',
    }
  }
  const { speed, device } = state
  const J = notedDesignDensity(speed, bench.guard, t)
  if (J === null) return { ...derivedRoute(speed, t), basis: speed.capability.binding }
  const gm_ID = t.calc(efficiency, transconductanceAt(device, J, t), J)
  const available = t.calc(selfGain, gm_ID, device.of.V_E, device.of.L)
  return {
    required,
    available,
    margin: t.calc(marginAtLeast, available, required),
    basis: 'device at the design point',
  }
}

const [SPEED, HEADROOM, STRESS] = stackChecks('Receive equaliser')

const CHECKS: readonly CheckSpec<Equaliser>[] = [
  {
    ...SPEED!,
    evaluate: (state, bench) =>
      'speed' in state ? SPEED!.evaluate(state, bench) : inverterSpeed(state, bench),
  },
  {
    ...HEADROOM!,
    evaluate: (state, bench) =>
      'speed' in state ? HEADROOM!.evaluate(state, bench) : inverterHeadroom(state, bench),
  },
  {
    ...STRESS!,
    evaluate: (state, bench) =>
      'speed' in state ? STRESS!.evaluate(state, bench) : wholeSupplyOutcome(state.V_high, bench),
  },
  {
    name: 'self_gain',
    title: 'Receive equaliser: self-gain',
    quantity: 'self-gain of the transistor',
    unit: '1',
    sense: 'at least',
    evaluate: selfGainOutcome,
  },
  {
    name: 'boost',
    title: 'Receive equaliser: boost',
    quantity: 'gain at the peak over gain at low frequency',
    unit: 'dB',
    sense: 'at least',
    asked: ({ settings }) => settings.receiver.ctle?.boost != null,
    evaluate: ({ chain }, bench) => boostOutcome(chain, bench),
  },
]

function results(state: Equaliser, bench: Bench): readonly NamedResult[] {
  const { t, nmos } = bench
  const { A, degeneration } = state.chain
  const low = {
    name: 'equaliser.gain_low_frequency',
    value: t.calc(lowFrequencyGain, A, degeneration),
    unit: '1',
  }
  if ('speed' in state)
    return [...deviceResults('equaliser', state.speed, state.device, 1, state.V_S, bench), low]
  const { n, f_T } = state.here
  const named = (name: string, value: number, unit: string): NamedResult => ({
    name: `device.equaliser.${name}`,
    value,
    unit,
  })
  const V_DSsat = saturationAt(nmos, n, t)
  return [
    named('fT_Hz', f_T, 'Hz'),
    named('IC', n.IC, '1'),
    named('J_A_per_m', n.J, 'A/m'),
    named('VGS_V', n.V_GS, 'V'),
    named('VDSsat_V', V_DSsat, 'V'),
    named('gmOverId_per_V', t.calc(efficiency, n.g_m, n.J), '1/V'),
    named('selfGain', inverterGain(state, bench), '1'),
    low,
  ]
}

/** The continuous-time receive equaliser and amplifier chain, of current-mode pairs or complementary stages. */
export const equaliser = subBlock<Equaliser>({
  id: 'equaliser',
  title: 'Receive equaliser',
  of: ['link'],
  asked: () => ASKED,
  prepare,
  checks: CHECKS,
  results,
})
