import { formula } from '../derivation/formula.ts'
import { marginAtLeast } from '../derivation/margin.ts'
import type { Trace } from '../derivation/trace.ts'
import { type FixedBias, fixedBiasAt, givenGateVoltage, laidOutAt } from '../device/fixed-bias.ts'
import { effectiveSpeed } from '../device/speed.ts'
import type { Bench } from './bench.ts'
import {
  constant,
  decisionSymbol,
  growthOf,
  INTEGRATION,
  REGENERATION,
  regenerationTime,
} from './decision.ts'
import { combineRoutes, type Rule, ruleRoute } from './stage-speed.ts'
import type { Outcome } from './sub-block.ts'

/** A dynamic (regenerative, clocked) latch: its devices stand at a gate voltage that the circuit gives. */

const BIAS = {
  symbol: 'V_g',
  meaning: 'gate–source voltage of a dynamic latch while it decides',
  unit: 'V',
  source: 'method of this planner',
  value: 0.65,
}

/** The nMOS of a dynamic latch at the lowest core supply. */
export function latchBias({ nmos, V_core, t }: Bench): FixedBias {
  return fixedBiasAt(nmos, t.calc(givenGateVoltage, constant(BIAS, t), V_core), t)
}

/** f_T ≥ κ_r (n_int + G_r) f_d/π: integration, reset and regeneration within half a period. kappa_r [1], n_int [1], G_r [1], f_d [Hz] → [Hz]. */
export const dynamicLatchDemand = formula(
  {
    symbol: 'f_T_req',
    meaning: 'device speed as laid out that the latch needs',
    unit: 'Hz',
    source: 'derived: τ (n_int + G_r) ≤ T/2 with τ = κ_r/(2π f_T)',
  },
  (kappa_r, n_int, G_r, f_d) => (kappa_r * (n_int + G_r) * f_d) / Math.PI,
)

const INPUT_LOAD = {
  symbol: 'C_in',
  meaning: 'input capacitance planned for each side of a latch',
  unit: 'F',
  source: 'common practice, no source',
  value: 10e-15,
}

/** W = C_in/C_eff. C_in [F], C_eff [F/m] → [m]. */
export const latchWidth = formula(
  { symbol: 'W', meaning: 'width of each input device', unit: 'm', source: 'definition' },
  (C_in, C_eff) => C_in / C_eff,
)

/** σ = A_VT/√(W L). A_VT [V*m], W [m], L [m] → [V]. */
export const pairOffset = formula(
  {
    symbol: 'sigma_os',
    meaning: 'offset of the input pair, rms',
    unit: 'V',
    source: 'M. Pelgrom, A. Duinmaijer, A. Welbers, IEEE JSSC 24(5), 1989',
  },
  (A_VT, W, L) => A_VT / Math.sqrt(W * L),
)

/** σ = σ_10 √(C_10/C_in): noise of a latch against 1 mV at 10 fF. sigma_10 [V], C_10 [F], C_in [F] → [V]. */
export const latchNoise = formula(
  {
    symbol: 'sigma_n',
    meaning: 'input-referred noise of the latch, rms',
    unit: 'V',
    source: 'common practice, no source: 1 mV at 10 fF',
  },
  (sigma_10, C_10, C_in) => sigma_10 * Math.sqrt(C_10 / C_in),
)

const NOISE = {
  symbol: 'sigma_10',
  meaning: 'input-referred noise of a latch on C_10, rms',
  unit: 'V',
  source: 'common practice, no source',
  value: 1e-3,
}
const NOISE_LOAD = {
  symbol: 'C_10',
  meaning: 'input capacitance that this noise belongs to',
  unit: 'F',
  source: 'common practice, no source',
  value: 10e-15,
}

/** A dynamic latch at its operating point. SI. */
export interface DynamicLatch {
  readonly bias: FixedBias
  readonly f_T: number
  readonly tau: number
  readonly f_d: number
  readonly rule: Rule
}

const NO_PEAKING = {
  symbol: 'beta',
  meaning: 'a dynamic latch has no peaking',
  unit: '1',
  source: 'definition',
}

/** A dynamic latch that decides at f_d [Hz]. */
export function dynamicLatch(bench: Bench, f_d: number): DynamicLatch {
  const { t, nmos, settings } = bench
  const bias = latchBias(bench)
  const f_T = effectiveSpeed(nmos, bias, t)
  return {
    bias,
    f_T,
    tau: t.calc(regenerationTime, constant(REGENERATION, t), f_T),
    f_d,
    rule: {
      key: 'sampler',
      f_op: f_d,
      of: decisionSymbol(bench),
      k: settings.demand.multiples.sampler,
      beta: t.leaf(NO_PEAKING, 1),
    },
  }
}

/** Speed of the latch against half a clock period, by both routes. */
export function dynamicLatchSpeed({ f_T, f_d, rule }: DynamicLatch, bench: Bench): Outcome {
  const { t, V_core } = bench
  const [kappa_r, n_int] = [constant(REGENERATION, t), constant(INTEGRATION, t)]
  const required = t.calc(dynamicLatchDemand, kappa_r, n_int, growthOf(bench), f_d)
  const derived = { required, available: f_T, margin: t.calc(marginAtLeast, f_T, required) }
  return {
    ...combineRoutes(ruleRoute(rule, bench), derived, bench, 'the gate voltage of the latch'),
    supply: V_core,
  }
}

/** Offset and noise [V] of a latch with the planned input capacitance. */
export function latchErrors(
  { bias }: DynamicLatch,
  { nmos, t }: Bench,
): { offset: number; noise: number; W: number } {
  const C_in = constant(INPUT_LOAD, t)
  const W = t.calc(latchWidth, C_in, laidOutAt(nmos, bias, t))
  return {
    W,
    offset: t.calc(pairOffset, nmos.of.A_VT, W, nmos.of.L),
    noise: t.calc(latchNoise, constant(NOISE, t), constant(NOISE_LOAD, t), C_in),
  }
}

/** Half a period in the latch and half in the one that follows, less integration and reset: t_reg = T_d − n_int τ, below zero when none is left. T_d [s], n_int [1], tau [s] → [s]. */
export const regenerationLeft = formula(
  { symbol: 't_reg', meaning: 'time left to regenerate', unit: 's', source: 'definition' },
  (T_d, n_int, tau) => T_d - n_int * tau,
)

/** Time left to regenerate [s] in a clock period T_d [s]. */
export function timeToRegenerate({ tau }: DynamicLatch, T_d: number, t: Trace): number {
  return t.calc(regenerationLeft, T_d, constant(INTEGRATION, t), tau)
}
