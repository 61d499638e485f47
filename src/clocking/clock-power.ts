import type { Bench } from '../blocks/bench.ts'
import {
  ASKED,
  type NamedResult,
  notAsked,
  type Outcome,
  type RouteOutcome,
  subBlock,
  type Unprepared,
} from '../blocks/sub-block.ts'
import { formula } from '../derivation/formula.ts'
import { marginAtMost } from '../derivation/margin.ts'
import { type BudgetLines, budgetLinesAt } from './budget/lines.ts'
import { RECEIVER_LOAD } from './path/buffer-jitter.ts'

/** Power of a clock generator, first order: ±50 %. */

const FIRST_ORDER = 'derived, ± 50 %'

/** P = n V I: current-mode stages. n_path [1], V [V], I_buf [A] → [W]. */
export const pathPower = formula(
  { symbol: 'P_path', meaning: 'power of the clock path', unit: 'W', source: FIRST_ORDER },
  (n_path, V, I_buf) => n_path * V * I_buf,
)

/** P = 2 n C_L V² f_ck: full-swing repeaters, whose own gates cost as much as their load. n_path [1], C_L [F], V_core [V], f_ck [Hz] → [W]. */
export const fullSwingPower = formula(
  { symbol: 'P_path', meaning: 'power of the clock path', unit: 'W', source: FIRST_ORDER },
  (n_path, C_L, V_core, f_ck) => 2 * n_path * C_L * V_core ** 2 * f_ck,
)

/** P = n V 2πf_0 C_in V_sw: latches of the first divider, each as strong as its load asks. n_lat [1], V [V], f_0 [Hz], C_in [F], V_sw [V] → [W]. */
export const firstDividerPower = formula(
  { symbol: 'P_div', meaning: 'power of the first divider', unit: 'W', source: FIRST_ORDER },
  (n_lat, V, f_0, C_in, V_sw) => n_lat * V * (2 * Math.PI * f_0 * C_in * V_sw),
)

/** P = 2 I_CP V + V² (C_log f_ref + C_dv f_0/2). I_CP [A], V_core [V], C_log [F], f_ref [Hz], C_dv [F], f_0 [Hz] → [W]. */
export const loopPower = formula(
  {
    symbol: 'P_loop',
    meaning: 'power of charge pump, logic at the reference frequency, and dividers after the first',
    unit: 'W',
    source: 'estimate',
  },
  (I_CP, V_core, C_log, f_ref, C_dv, f_0) =>
    2 * I_CP * V_core + V_core ** 2 * (C_log * f_ref + (C_dv * f_0) / 2),
)

/** P = P_osc + P_div + P_path + P_loop. P_osc [W], P_div [W], P_path [W], P_loop [W] → [W]. */
export const generatorPower = formula(
  { symbol: 'P_total', meaning: 'power of the clock generator', unit: 'W', source: 'law: power adds' },
  (P_osc, P_div, P_path, P_loop) => P_osc + P_div + P_path + P_loop,
)

const LATCHES = {
  symbol: 'n_lat',
  meaning: 'latches of the first divider',
  unit: '1',
  source: 'definition',
  path: 'divider.kind',
}
const LOGIC = {
  symbol: 'C_log',
  meaning: 'capacitance that the logic switches in each reference period',
  unit: 'F',
  source: 'estimate',
  value: 5e-12,
}
const DIVIDERS = {
  symbol: 'C_dv',
  meaning: 'capacitance that the dividers after the first switch at its output',
  unit: 'F',
  source: 'estimate',
  value: 50e-15,
}

/** Power of a clock generator by part [W]. */
interface ClockPower {
  readonly oscillator: number
  readonly divider: number
  readonly path: number
  readonly loop: number
  readonly total: number
}

type State =
  | ClockPower
  | { readonly short: RouteOutcome & { readonly margin: number }; readonly binding: string }

function prepare(bench: Bench): State | Unprepared {
  const lines = bench.once(budgetLinesAt)
  return 'sigma_all' in lines ? powerOf(lines, bench) : lines
}

function powerOf({ loop, path }: BudgetLines, bench: Bench): ClockPower {
  const { t, settings, stack, V_core, rates } = bench
  const { power: oscillator, f_0 } = loop.sources.oscillator
  const V = stack.missing === undefined ? stack.V : V_core
  const latches = settings.divider.kind === 'none' ? 0 : 2
  const C_in = t.leaf(RECEIVER_LOAD, RECEIVER_LOAD.value)
  const parts = {
    oscillator,
    divider: t.calc(firstDividerPower, t.leaf(LATCHES, latches), V, f_0, C_in, settings.headroom.latch_swing),
    path:
      path.I_buf === null
        ? t.calc(fullSwingPower, path.stages, path.C_L, V_core, rates.f_ck)
        : t.calc(pathPower, path.stages, V, path.I_buf),
    loop: t.calc(
      loopPower,
      settings.loop!.charge_pump_current,
      V_core,
      t.leaf(LOGIC, LOGIC.value),
      settings.loop!.reference,
      t.leaf(DIVIDERS, DIVIDERS.value),
      f_0,
    ),
  }
  return { ...parts, total: t.calc(generatorPower, parts.oscillator, parts.divider, parts.path, parts.loop) }
}

function budgetOutcome(state: State, { settings, t }: Bench): Outcome {
  if ('short' in state) return { ...state.short, basis: state.binding }
  const limit = settings.power_budget!
  return {
    required: limit,
    available: state.total,
    margin: t.calc(marginAtMost, limit, state.total),
    basis: 'first order, ± 50 %',
  }
}

const PARTS = [
  ['power.total_W', 'total'],
  ['power.oscillator_W', 'oscillator'],
  ['power.divider_W', 'divider'],
  ['power.path_W', 'path'],
  ['power.loop_W', 'loop'],
] as const

/** Power of a clock generator against its budget. */
export const clockPower = subBlock<State>({
  id: 'power',
  title: 'Power of the clock generator',
  of: ['clock'],
  asked: ({ settings }) => {
    if (settings.power_budget === null) return notAsked('the scenario states no power budget')
    return ASKED
  },
  prepare,
  checks: [
    {
      name: 'total',
      title: 'Power of the clock generator',
      quantity: 'power',
      unit: 'W',
      sense: 'at most',
      evaluate: budgetOutcome,
    },
  ],
  results: (state): readonly NamedResult[] =>
    'short' in state ? [] : PARTS.map(([name, part]) => ({ name, value: state[part], unit: 'W' })),
})
