import type { CaseResult, CheckResult, Result } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'
import { marginText } from '../text/margin.ts'
import { caseName } from './case-names.ts'
import type { DerivationGroup } from './memo-model.ts'
import { limitingCheck } from './ranking.ts'
import type { StepBook } from './steps.ts'

/**
 * The derivation of the limiting check of every case. Cases whose derivations go through the same formulas in
 * the same order stand together, so that paper need not repeat the formulas.
 */
export function derivationGroups(result: Result, guard: number, book: StepBook): readonly DerivationGroup[] {
  const groups = new Map<string, { given: CaseResult; check: CheckResult }[]>()
  for (const given of result.cases) {
    const check = limitingCheck(given)
    if (check === undefined || check.steps.length === 0) continue
    const way = JSON.stringify([
      check.id,
      check.steps.map(({ kind, symbol, formula }) => [kind, symbol, formula]),
    ])
    const group = groups.get(way) ?? []
    group.push({ given, check })
    groups.set(way, group)
  }
  return [...groups.values()].map((group) => ({
    title: clean(group[0]!.check.title),
    cases: group.map(({ given, check }) => ({
      name: caseName(given),
      option: clean(given.option),
      node: clean(given.node),
      verdict: check.verdict,
      margin: marginText(check.margin, guard),
      steps: check.steps.map((step) => book.shown(step)),
    })),
  }))
}
