import { marginAtLeast } from '../derivation/margin.ts'
import { lcPair } from '../device/stacks/lc-pair.ts'
import { tailVoltage } from '../device/stacks/lines.ts'
import type { Bench } from './bench.ts'
import { notedDesignDensity } from './design-point.ts'
import { AMPLITUDE_CHECKS } from './lc-amplitude.ts'
import { oscillatorResults } from './lc-results.ts'
import {
  demandOf,
  fixedShareAt,
  type LcOscillator,
  loopGainOfCurrent,
  loopGainOfShare,
  noRoom,
  sideEfficiency,
} from './lc-start-up.ts'
import { beyondPublished, reachableRatio, tankOf } from './lc-tank.ts'
import { rangeCheck } from './oscillator-range.ts'
import { stackChecks } from './stack-checks.ts'
import { combineRoutes, derivedRoute, ruleRoute, stageSpeed } from './stage-speed.ts'
import { ASKED, type CheckSpec, notAsked, type Outcome, subBlock, type Unprepared } from './sub-block.ts'

const NO_TAIL = { symbol: 'V_tail', meaning: 'no tail source', unit: 'V', source: 'definition' }

/** The LC oscillator of a case at its operating point, or why there is none. */
export function lcOscillatorAt(bench: Bench): LcOscillator | Unprepared {
  const { stack, settings, t } = bench
  const oscillator = settings.oscillator!
  if (stack.missing !== undefined) return { unknown: stack.missing }
  if (oscillator.pair === 'complementary' && stack.device !== bench.nmos) {
    return { unknown: 'the node states no thick-oxide pMOS for a complementary pair under the io supply' }
  }
  const { device: nmos, V, V_high } = stack
  const pmos = oscillator.pair === 'complementary' ? bench.pmos : null
  const V_tail =
    oscillator.tail === 'yes' ? t.calc(tailVoltage, settings.headroom.tail, nmos.U_T) : t.leaf(NO_TAIL, 0)
  const tank = tankOf(oscillator, bench)
  const demand = demandOf(tank, bench)
  const f_T = demand.room === null ? Number.POSITIVE_INFINITY : demand.room.f_T
  const k = settings.demand.multiples.lc_oscillator
  const rule = { key: 'lc_oscillator', f_op: tank.f_max, of: 'f_max', k, beta: t.leaf(NO_PEAKING, 1) }
  const speed = stageSpeed({ stage: lcPair({ nmos, pmos, V_tail }), V, rule, demand: () => f_T }, t)
  return { speed, V_S: V_tail, V_high, tank, demand, nmos, pmos }
}

const NO_PEAKING = {
  symbol: 'beta',
  meaning: 'a resonant tank is not widened by peaking',
  unit: '1',
  source: 'definition',
}

/** True when the pair has an operating point but the range leaves it no room at any speed. */
const roomless = ({ speed, demand }: LcOscillator): boolean =>
  demand.room === null && speed.capability.J !== null

function speedOf(state: LcOscillator, bench: Bench): Outcome {
  const { speed, tank } = state
  const derived = roomless(state) ? noRoom(tank, bench.t) : derivedRoute(speed, bench.t)
  return combineRoutes(ruleRoute(speed.rule, bench), derived, bench, speed.capability.binding)
}

function tuningOutcome({ speed, tank, demand }: LcOscillator, bench: Bench): Outcome {
  const { t } = bench
  const { J } = speed.capability
  if (J === null) return { ...derivedRoute(speed, t), basis: speed.capability.binding }
  const s_f = fixedShareAt(tank, demand.kappa, speed.stage.speed(J, t), t)
  const available = t.calc(reachableRatio, s_f, tank.rho)
  const reason = beyondPublished(tank)
  return {
    required: tank.K,
    available,
    margin: t.calc(marginAtLeast, available, tank.K),
    basis: 'device share at the f_T under headroom; bank from its switch',
    ...(reason === undefined ? {} : { reason }),
  }
}

function startUpOutcome(state: LcOscillator, bench: Bench): Outcome {
  const { speed, tank, demand } = state
  const { t } = bench
  const { J } = speed.capability
  if (J === null) return { ...derivedRoute(speed, t), basis: speed.capability.binding }
  const { current, startup_gain: S } = tank.oscillator
  if (current === null && demand.room === null) return { ...noRoom(tank, t), basis: 'room for the pair' }
  const available = current === null ? gainOfShare(state, J, bench) : gainOfCurrent(state, current, bench)
  return {
    required: S,
    available,
    margin: t.calc(marginAtLeast, available, S),
    basis: current === null ? 'widest pair that the range leaves room for' : 'stated current',
  }
}

function gainOfShare({ speed, tank, demand }: LcOscillator, J: number, { t }: Bench): number {
  const { C_t, Q_lo, kappa } = demand
  const f_T = speed.stage.speed(J, t)
  return t.calc(loopGainOfShare, demand.room!.s_dev, C_t, f_T, Q_lo, tank.f_lo, tank.L_d, kappa)
}

/** At the design point: a slower bias would start on less current but no longer fit the tank. */
function gainOfCurrent({ speed, tank, demand, nmos, pmos }: LcOscillator, I: number, bench: Bench): number {
  const { t } = bench
  const J = notedDesignDensity(speed, bench.guard, t)!
  const gm_ID = sideEfficiency(nmos, pmos, J, t)
  return t.calc(loopGainOfCurrent, gm_ID, I, demand.Q_lo, tank.f_lo, tank.L_d)
}

const [SPEED, HEADROOM, STRESS] = stackChecks('LC oscillator')

const CHECKS: readonly CheckSpec<LcOscillator>[] = [
  { ...SPEED!, evaluate: speedOf },
  HEADROOM!,
  // Between complementary pairs a node rests at half the supply and no device sees all of it.
  {
    ...STRESS!,
    asked: (given) => given.settings.oscillator?.pair === 'nMOS' && STRESS!.asked!(given),
  },
  {
    name: 'tuning',
    title: 'LC oscillator: tuning range',
    quantity: 'ratio of largest to smallest tank capacitance',
    unit: '1',
    sense: 'at least',
    evaluate: tuningOutcome,
  },
  {
    name: 'start_up',
    title: 'LC oscillator: start-up',
    quantity: 'loop gain at the low end',
    unit: '1',
    sense: 'at least',
    evaluate: startUpOutcome,
  },
  ...AMPLITUDE_CHECKS,
  rangeCheck('LC oscillator'),
]

/** The LC oscillator: speed, headroom, tuning range, start-up, amplitude. */
export const lcOscillator = subBlock<LcOscillator>({
  id: 'lc_oscillator',
  title: 'LC oscillator',
  of: ['link', 'clock'],
  asked: ({ settings: { oscillator } }) => {
    if (oscillator === null) return notAsked('the scenario states no oscillator')
    return oscillator.kind === 'LC' ? ASKED : notAsked('the oscillator is a ring')
  },
  prepare: lcOscillatorAt,
  checks: CHECKS,
  results: oscillatorResults,
})
