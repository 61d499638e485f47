import type { Bench } from '../blocks/bench.ts'
import {
  ASKED,
  type CheckSpec,
  notAsked,
  type Outcome,
  subBlock,
  type Unprepared,
} from '../blocks/sub-block.ts'
import { marginAtMost } from '../derivation/margin.ts'
import { type Allowance, allowanceOf, isAllowed, type Quantity, quantile } from './budget/allowances.ts'
import { rmsJitter, tailJitter, totalJitter } from './budget/dual-dirac.ts'
import { type BudgetLines, budgetLinesAt, type LinesFound } from './budget/lines.ts'
import { whatItTakes } from './missed-budget.ts'

type State = BudgetLines | Extract<LinesFound, { readonly short: unknown }>

const prepare = (bench: Bench): State | Unprepared => bench.once(budgetLinesAt)

/** Actual jitter of a quantity [s], or why there is none. */
type Actual = (
  lines: BudgetLines,
  allowance: Allowance,
  bench: Bench,
) => number | { readonly unknown: string }

const randomOf = ({ sigma_tx, sigma_all }: BudgetLines, { counts }: Allowance): number =>
  counts === 'all' ? sigma_all : sigma_tx
const boundedOf = ({ DJ_tx, DJ_all }: BudgetLines, { counts }: Allowance): number =>
  counts === 'all' ? DJ_all : DJ_tx

const ACTUAL: Readonly<Record<Quantity, Actual>> = {
  random: randomOf,
  bounded: boundedOf,
  total: (lines, allowance, { t, settings }) => {
    const { error_ratio } = allowance
    if (error_ratio === null)
      return { unknown: 'total jitter needs an error ratio, and the scenario states none' }
    const source = error_ratio === settings.error_ratio ? 'this scenario' : allowance.basis
    const Q = quantile(error_ratio, source, t)
    return t.calc(totalJitter, boundedOf(lines, allowance), Q, randomOf(lines, allowance))
  },
  even_odd: ({ path }) => path.J_eo,
  rms: (lines, allowance, { t }) =>
    t.calc(rmsJitter, boundedOf(lines, allowance), randomOf(lines, allowance)),
  tail: (lines, allowance, { t }) => {
    const Q_n = quantile(0.5 * 10 ** -allowance.n!, allowance.basis, t)
    return t.calc(tailJitter, boundedOf(lines, allowance), Q_n, randomOf(lines, allowance))
  },
}

const evaluate =
  (quantity: Quantity) =>
  (state: State, bench: Bench): Outcome => {
    if ('short' in state) return { ...state.short, basis: state.binding }
    const { t } = bench
    const allowance = allowanceOf(bench, quantity)
    const actual = ACTUAL[quantity](state, allowance, bench)
    const { limit, basis, sure } = allowance
    if (typeof actual !== 'number') {
      return { required: limit, available: null, margin: null, basis, reason: actual.unknown }
    }
    const margin = t.calc(marginAtMost, limit, actual)
    if (!sure) {
      const reason = `the limit is UNSURE and decides nothing: against it the margin would be ${margin.toFixed(2)}; read the standard and state the allowance`
      return { required: limit, available: actual, margin: null, basis, reason }
    }
    const need = quantity === 'random' && margin < 1 ? whatItTakes(state, actual, limit, bench) : undefined
    return {
      required: limit,
      available: actual,
      margin,
      basis,
      ...(need === undefined ? {} : { reason: need }),
    }
  }

const check = (quantity: Quantity, title: string, what: string): CheckSpec<State> => ({
  name: quantity,
  title: `Jitter: ${title}`,
  quantity: what,
  unit: 's',
  sense: 'at most',
  ...(quantity === 'even_odd'
    ? { because: 'no allowance for it is stated, or the clock has one phase' }
    : {}),
  asked: (given) => isAllowed(given, quantity),
  evaluate: evaluate(quantity),
})

/** The jitter budget against its allowances. */
export const jitterBudget = subBlock<State>({
  id: 'jitter',
  title: 'Jitter budget',
  of: ['link', 'clock'],
  asked: ({ settings }) =>
    settings.jitter_budget === null ? notAsked('the scenario states no jitter budget') : ASKED,
  prepare,
  checks: [
    check('random', 'random', 'random jitter, rms'),
    check('bounded', 'bounded', 'bounded jitter, peak to peak'),
    check('total', 'total at the error target', 'total jitter, peak to peak'),
    check('even_odd', 'even-odd', 'even-odd jitter, peak to peak'),
    check('rms', 'rms with its bounded part', 'J_rms'),
    check('tail', 'all but the tails', 'J_n'),
  ],
  results: () => [],
})
