import { formula } from '../derivation/formula.ts'
import { marginAtLeast } from '../derivation/margin.ts'
import type { Trace } from '../derivation/trace.ts'
import { type Capability, capability, type Demand, densityForSpeed } from '../device/available.ts'
import type { Stage } from '../device/stage.ts'
import type { Bench } from './bench.ts'
import type { Outcome, RouteOutcome } from './sub-block.ts'

/** The demand of a sub-block on device speed, by rule of thumb and by derivation, and the stage that must meet it. */
export interface StageSpeed {
  readonly stage: Stage
  /** Lowest supply of the stage [V]. */
  readonly V: number
  readonly capability: Capability
  readonly rule: Rule
  /** Device speed [Hz] that the circuit needs when its devices carry J. */
  readonly demand: Demand
}

/** A rule of thumb: the node's intrinsic peak f_T must reach k times the operating frequency over β. */
export interface Rule {
  /** Key under `demand.multiples` and `demand.formulas`. */
  readonly key: string
  readonly f_op: number
  /** Symbol of the operating frequency. */
  readonly of: string
  readonly k: number
  readonly beta: number
}

/** f_rule = k f_op/β. k [1], f_op [Hz], beta [1] → [Hz]. */
export const ruleDemand = formula(
  {
    symbol: 'f_rule',
    meaning: 'device speed that the rule of thumb asks for',
    unit: 'Hz',
    source: 'common practice, no source',
  },
  (k, f_op, beta) => (k * f_op) / beta,
)

/** The smaller of two margins. margin_rule [1], margin_derived [1] → [1]. */
export const stricterMargin = formula(
  { symbol: 'margin', meaning: 'the stricter of both routes', unit: '1', source: 'method of this planner' },
  (margin_rule, margin_derived) => Math.min(margin_rule, margin_derived),
)

/** Shortfall of the supply as a margin: V/V_any. V [V], V_any [V] lowest supply with any operating point → [1]. */
export const supplyMargin = formula(
  {
    symbol: 'margin',
    meaning: 'supply over the lowest one with any operating point',
    unit: '1',
    source: 'method of this planner',
  },
  (V, V_any) => V / V_any,
)

/** Builds the speed question of a stage and finds what the stage can do. */
export function stageSpeed(given: Omit<StageSpeed, 'capability'>, t: Trace): StageSpeed {
  const { stage, V, rule, demand } = given
  return { stage, V, rule, demand, capability: capability(stage, V, t) }
}

/** The rule-of-thumb route: intrinsic peak f_T (typical, blind to headroom) against k f_op/β. */
export function ruleRoute(rule: Rule, bench: Bench): RouteOutcome {
  const { t } = bench
  const own = bench.rules[rule.key]
  t.alias('f_op', rule.of)
  const required =
    own === undefined ? t.calc(ruleDemand, rule.k, rule.f_op, rule.beta) : userDemand(own, rule, bench)
  const available = bench.peak
  if (!(required > 0 && required < Number.POSITIVE_INFINITY)) {
    const reason = `the given rule ${own?.text ?? ''} yields no positive frequency here`
    return { required: null, available, margin: null, reason }
  }
  return { required, available, margin: t.calc(marginAtLeast, available, required) }
}

function userDemand(own: NonNullable<Bench['rules'][string]>, rule: Rule, bench: Bench): number {
  const { f_B, f_N, f_ck } = bench.rates
  const inputs = {
    f_op: rule.f_op,
    k: rule.k,
    beta: rule.beta,
    f_ck,
    f_osc: bench.settings.oscillator?.range[1] ?? f_ck,
    ...(f_B === null ? {} : { f_B }),
    ...(f_N === null ? {} : { f_N }),
  }
  const about = {
    symbol: 'f_rule',
    meaning: 'device speed that the given rule asks for',
    unit: 'Hz',
    source: 'this scenario',
  }
  const required = own.run(inputs)
  if (!Number.isFinite(required)) return Number.NaN
  return bench.t.expression({ ...about, text: own.text }, required, inputs)
}

/** The derived route: f_T available under headroom against the closed form of the circuit. */
export function derivedRoute(speed: StageSpeed, t: Trace): RouteOutcome & { readonly margin: number } {
  const { stage, capability: found, V } = speed
  if (found.J !== null) {
    const available = stage.speed(found.J, t)
    const required = speed.demand(found.J, t)
    return { required, available, margin: t.calc(marginAtLeast, available, required) }
  }
  if (found.V_any === null) {
    const margin = found.window.impossible!
    const about = {
      symbol: 'margin',
      meaning: `voltage available over voltage needed by the line ${found.binding}`,
      unit: '1',
    }
    const noted = {
      ...about,
      source: 'method of this planner',
      method: 'ends of the window of current per width',
      error: '1e-10',
    }
    return {
      required: null,
      available: null,
      margin: t.kernel(noted, margin, stage.givens),
      reason: `no operating point at any supply: ${found.binding}`,
    }
  }
  const V_any = t.kernel(LOWEST_SUPPLY, found.V_any, stage.givens)
  const short = Math.ceil((found.V_any - V) * 1000)
  return {
    required: null,
    available: null,
    margin: t.calc(supplyMargin, V, V_any),
    reason: `no operating point: the supply is ${short} mV short for the line ${found.binding}`,
  }
}

const LOWEST_SUPPLY = {
  symbol: 'V_any',
  meaning: 'lowest supply at which the stack has any operating point',
  unit: 'V',
  source: 'the lines of the stage at the smallest admissible current per width',
  method: 'lines of the stage evaluated at the lower end of the window of current per width',
  error: '1e-10 relative',
}

/** The speed check of a sub-block, by the route the scenario chose. */
export function speedOutcome(speed: StageSpeed, bench: Bench): Outcome {
  return combineRoutes(
    ruleRoute(speed.rule, bench),
    derivedRoute(speed, bench.t),
    bench,
    speed.capability.binding,
  )
}

/** Puts both routes together: the scenario's route governs, the other is shown beside it. */
export function combineRoutes(
  rule: RouteOutcome,
  derived: RouteOutcome & { readonly margin: number },
  bench: Bench,
  binding: string,
): Outcome {
  const { route } = bench.settings.demand
  if (rule.margin === null && route !== 'derived') return withoutRule(rule, derived)
  const byRule = rule.margin ?? Number.POSITIVE_INFINITY
  const governs = route !== 'stricter' ? route : byRule < derived.margin ? 'rule' : 'derived'
  const governing = governs === 'rule' ? rule : derived
  const margin =
    route === 'stricter' ? bench.t.calc(stricterMargin, byRule, derived.margin) : governing.margin
  const outcome: Outcome = {
    required: governing.required,
    available: governing.available,
    margin,
    basis: governs === 'rule' ? RULE_BASIS : derivedBasis(binding),
    rule,
    derived,
  }
  if (governing.reason === undefined && !bench.t.recording) return outcome
  const other = governs === 'rule' ? derived : rule
  return {
    ...outcome,
    ...(governing.reason === undefined ? {} : { reason: governing.reason }),
    alsoShown: [other.required, other.available].filter((value) => value !== null),
  }
}

/** A rule that was asked and yields nothing makes the check unknown; its reason is told, the derived route shown. */
function withoutRule(rule: RouteOutcome, derived: RouteOutcome): Outcome {
  const { required, available, margin, reason } = rule
  return {
    required,
    available,
    margin,
    basis: RULE_BASIS,
    ...(reason === undefined ? {} : { reason }),
    rule,
    derived,
  }
}

const RULE_BASIS = 'rule of thumb on the intrinsic peak f_T'
const derivedBasis = (binding: string): string => `derived; bound by ${binding}`

/** The headroom check: lowest supply of the case against the supply at which the required speed is available. */
export function headroomOutcome(speed: StageSpeed, bench: Bench): Outcome {
  const { stage, V, capability: found } = speed
  const { t } = bench
  if (found.J === null && found.V_any === null) {
    const { margin, reason } = derivedRoute(speed, t)
    return {
      required: null,
      available: V,
      margin,
      basis: found.binding,
      ...(reason === undefined ? {} : { reason }),
    }
  }
  const wanted = densityForSpeed(stage, found, speed.demand, 1)
  const J = noteRequired(wanted.J, wanted.reached, stage, t)
  const V_need = stage.supplyNeeded(J, t)
  const enough = t.calc(marginAtLeast, V, V_need)
  const shared = { required: V_need, available: V, basis: stage.bindingAt(J) }
  if (wanted.reached) return { ...shared, margin: enough }
  const reason = 'the required speed is out of reach at any supply; judged at the highest speed there is'
  const demand = speed.demand(J, t)
  // A demand without bound is not one on speed: what makes it so is judged by a check of its own.
  if (!Number.isFinite(demand)) return { ...shared, margin: enough, reason }
  const share = t.calc(speedShare, stage.speed(J, t), demand)
  return { ...shared, margin: t.calc(unreachedMargin, enough, share), reason }
}

/** f_T/f_T_req at the highest speed that any supply gives. f_T [Hz], f_T_req [Hz] → [1]. */
export const speedShare = formula(
  {
    symbol: 'f_share',
    meaning: 'highest speed at any supply over the required speed',
    unit: '1',
    source: 'definition',
  },
  (f_T, f_T_req) => f_T / f_T_req,
)

/** The smaller of both: no supply gives the speed, so the margin stays below 1. margin_V [1], f_share [1] → [1]. */
export const unreachedMargin = formula(
  {
    symbol: 'margin',
    meaning: 'supply, and speed at any supply, whichever lacks more',
    unit: '1',
    source: 'method of this planner',
  },
  (margin_V, f_share) => Math.min(margin_V, f_share),
)

function noteRequired(J: number, reached: boolean, stage: Stage, t: Trace): number {
  if (J === stage.J_lim) return J
  return t.search(
    {
      symbol: 'J',
      meaning: reached
        ? 'current per width that gives the required speed'
        : 'largest current per width that any supply allows',
      unit: 'A/m',
      source: 'search over the current per width',
      residual: reached ? 'f_T(J) - f_T_req(J)' : 'V_sw - A J/g_m(J)',
      tolerance: '1e-10 relative in ln J',
    },
    J,
    t.recording ? stage.givens : undefined,
  )
}
