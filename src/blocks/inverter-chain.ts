import { formula } from '../derivation/formula.ts'
import { marginAtLeast } from '../derivation/margin.ts'
import { PLAIN, type Trace } from '../derivation/trace.ts'
import {
  type Inverter,
  inverterAt,
  inverterSelfGain,
  inverterWith,
  saturationAt,
} from '../device/fixed-bias.ts'
import { halfSupply } from '../device/fo4.ts'
import { speedAt } from '../device/speed.ts'
import { gateVoltageAt } from '../device/voltage.ts'
import { rootBetween } from '../numeric/root.ts'
import type { Bench } from './bench.ts'
import { dataBandwidth } from './current-mode-driver.ts'
import { chainDemand, type LinearChain, linearChain } from './linear-chain.ts'
import { loadFactor } from './load.ts'
import { combineRoutes, type Rule, ruleRoute } from './stage-speed.ts'
import type { Outcome, Unprepared } from './sub-block.ts'

/**
 * A receive chain of complementary (inverter) stages at the core supply, each gate resting at half of it.
 *
 * The load sets the gain and is taken as resistive, as in a current-mode stage. A stage loaded by an inverter in
 * feedback carries that one's gate and drain as well and needs up to half as much speed again.
 */

/** V_swing = 2(V_DSsat + V_lin/4): the larger saturation voltage and the single-ended peak on each side. V_DSsat_n [V], V_DSsat_p [V], V_lin [V] differential peak to peak → [V]. */
export const inverterSwingSupply = formula(
  {
    symbol: 'V_swing',
    meaning: 'supply that the linear swing asks for',
    unit: 'V',
    source: 'derived: the output rests at V/2 and must stay one saturation voltage inside each rail',
  },
  (V_DSsat_n, V_DSsat_p, V_lin) => 2 * (Math.max(V_DSsat_n, V_DSsat_p) + V_lin / 4),
)

/** V_need = 2 V_GS: both gates rest at half the supply. V_GS [V] → [V]. */
export const supplyOfGate = formula(
  {
    symbol: 'V_need',
    meaning: 'lowest supply at which the stages reach their speed and their swing',
    unit: 'V',
    source: 'definition: V_GS = V/2 of both devices',
  },
  (V_GS) => 2 * V_GS,
)

/** A chain of complementary stages at the lowest supply of the stacked stages: an analogue supply where there is one. */
export interface InverterChain {
  readonly chain: LinearChain
  readonly here: Inverter
  readonly BW: number
  readonly rule: Rule
  /** Lowest and highest supply [V]. */
  readonly V: number
  readonly V_high: number
}

/** The chain at its operating point. */
export function inverterChain(bench: Bench): InverterChain | Unprepared {
  const { settings, rates, nmos, pmos, stack, t } = bench
  if (stack.missing !== undefined) return { unknown: stack.missing }
  if (stack.device !== nmos) {
    return { unknown: 'the node states no thick-oxide pMOS for complementary stages under the io supply' }
  }
  const { V, V_high } = stack
  const chain = linearChain(settings, t)
  const f_N = rates.f_N!
  return {
    chain,
    here: inverterAt(nmos, pmos, t.calc(halfSupply, V), t),
    BW: t.calc(dataBandwidth, settings.receiver.bandwidth_factor, f_N),
    rule: {
      key: 'equaliser',
      f_op: f_N,
      of: 'f_N',
      k: settings.demand.multiples.equaliser,
      beta: chain.beta,
    },
    V,
    V_high,
  }
}

function demandAt({ chain, BW }: InverterChain, c_lay: number, { settings, node }: Bench, t: Trace): number {
  const { m, d, w } = node.shares
  const load = t.calc(loadFactor, settings.receiver.fan_out, chain.A, m, c_lay, d, w)
  return t.calc(chainDemand, BW, chain.A, load, chain.beta, chain.shrink)
}

/** Speed of the stages against what the chain needs, by both routes. */
export function inverterSpeed(state: InverterChain, bench: Bench): Outcome {
  const { t } = bench
  const required = demandAt(state, state.here.c_lay, bench, t)
  const available = state.here.f_T
  const derived = { required, available, margin: t.calc(marginAtLeast, available, required) }
  return combineRoutes(ruleRoute(state.rule, bench), derived, bench, 'half the supply on each gate')
}

/** How far speed and swing exceed what is needed when the nMOS carries J per width, as shares of it. */
function spareAt(state: InverterChain, bench: Bench, J: number): { speed: number; swing: number } {
  const { nmos, pmos, settings } = bench
  const V_GS = gateVoltageAt(nmos, J, 0, PLAIN)
  const at = inverterWith({ ...speedAt(nmos, J, PLAIN), V_GS, J }, nmos, pmos, PLAIN)
  const V_n = saturationAt(nmos, at.n, PLAIN)
  const V_p = saturationAt(pmos, at.p, PLAIN)
  const V_swing = inverterSwingSupply.run(V_n, V_p, settings.receiver.linear_swing)
  return {
    speed: at.f_T / demandAt(state, at.c_lay, bench, PLAIN) - 1,
    swing: supplyOfGate.run(V_GS) / V_swing - 1,
  }
}

interface Needed {
  readonly J: number
  readonly reached: boolean
  readonly basis: string
}

/** The smallest current per width of the nMOS at which speed and swing suffice; else the largest admissible one. */
function neededDensity(state: InverterChain, bench: Bench): Needed {
  const { J_lim, I_spec, of } = bench.nmos
  const basisAt = (J: number): string => {
    const { speed, swing } = spareAt(state, bench, J)
    return speed < swing ? 'speed at half the supply' : 'linear swing between the rails'
  }
  // In √J, in which voltages and speed are nearly straight lines.
  const spare = (x: number): number => {
    const { speed, swing } = spareAt(state, bench, x * x)
    return Math.min(speed, swing)
  }
  const [low, high] = [Math.sqrt(0.01 * (I_spec / of.L)), Math.sqrt(J_lim)]
  const [atLow, atHigh] = [spare(low), spare(high)]
  if (atHigh < 0) return { J: J_lim, reached: false, basis: basisAt(J_lim) }
  const J = atLow >= 0 ? low * low : rootBetween(spare, low, atLow, high, atHigh, TOLERANCE, true) ** 2
  return { J, reached: true, basis: basisAt(J) }
}

const TOLERANCE = 1e-9
const NEEDED = {
  symbol: 'J',
  meaning: 'current per width of the nMOS at which speed and swing just suffice',
  unit: 'A/m',
  source: 'search over the current per width, the pMOS at the same gate–source voltage',
  residual: 'min(f_T/f_T_req - 1, 2 V_GS/V_swing - 1)',
  tolerance: '1e-9 relative in √J',
}
const ON_BULK = { symbol: 'V_S', meaning: 'sources stand on their bulk', unit: 'V', source: 'definition' }

/** The lowest supply against the lowest that gives the required speed and swing. */
export function inverterHeadroom(state: InverterChain, bench: Bench): Outcome {
  const { t, nmos, settings } = bench
  const { J: found, reached, basis } = neededDensity(state, bench)
  const { A, shrink, beta } = state.chain
  const inputs = { BW: state.BW, A, beta, shrink, V_lin: settings.receiver.linear_swing }
  const J = reached ? t.search(NEEDED, found, t.recording ? inputs : undefined) : found
  const required = t.calc(supplyOfGate, gateVoltageAt(nmos, J, t.leaf(ON_BULK, 0), t))
  return {
    required,
    available: state.V,
    margin: t.calc(marginAtLeast, state.V, required),
    basis,
    ...(reached
      ? {}
      : { reason: 'out of reach at any supply; judged at the largest admissible current per width' }),
  }
}

/** Self-gain of the pair at half the supply [1]. */
export function inverterGain({ here: { n, p, r_w } }: InverterChain, { nmos, pmos, t }: Bench): number {
  return t.calc(inverterSelfGain, n.g_m, r_w, p.g_m, n.J, nmos.of.V_E, nmos.of.L, pmos.of.V_E, pmos.of.L)
}
