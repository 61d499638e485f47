import type { Case } from '../blocks/bench.ts'
import { benchAt } from '../blocks/bench.ts'
import { keeping } from '../blocks/kept.ts'
import { ratesOf } from '../blocks/rates.ts'
import type { AnySubBlock, Outcome } from '../blocks/sub-block.ts'
import { clockingShown } from '../clocking/shown.ts'
import { PLAIN } from '../derivation/trace.ts'
import type { OperatingPoint } from '../device/conditions.ts'
import type { Node } from '../nodes/node.ts'
import type { OptionInput, Scenario } from '../scenario/checked.ts'
import { answerOf } from './answer.ts'
import { type Asking, askedOf } from './asked.ts'
import { assumptionsOf, methodAssumptions } from './assumptions.ts'
import { type FailingEnd, judged } from './ends.ts'
import { explaining } from './explain.ts'
import { laterChecks, laterNotExamined, laterResults } from './later.ts'
import { givenLeaves } from './leaves.ts'
import { outcomesAt, type Worst } from './margins.ts'
import { type CasePoints, casePoints } from './points.ts'
import {
  type CaseResult,
  type CheckResult,
  type NamedValue,
  type OperatingPointShown,
  type OptionShown,
  RESULT_FORMAT,
  type Result,
} from './result.ts'
import { caseVerdict, limitingCheck, verdictOf } from './verdict.ts'

/** What the evaluation is told by the outside: who computes, from which files, with which compiled rules. */
export interface About {
  readonly tool: { readonly name: string; readonly version: string }
  readonly inputs: readonly { readonly file: string; readonly sha256: string }[]
  /** Whether every check carries its derivation; without it the steps are empty. */
  readonly explain: boolean
}

/** Evaluates every option in every node. Pure: the same input gives the same result. */
export function evaluateScenario(scenario: Scenario, nodes: readonly Node[], about: About): Result {
  const { head, options } = scenario
  const cases = options.flatMap((option) =>
    nodes.map((node) => evaluateCase(caseOf(scenario, option, node), option, node, about)),
  )
  return {
    format: RESULT_FORMAT,
    tool: about.tool,
    scenario: {
      title: head.title,
      question: head.question,
      revision: head.revision,
      date: head.date,
      authors: head.authors ?? [],
      notes: head.notes,
      block: head.block,
    },
    inputs: about.inputs,
    guard: options[0]?.settings.guard ?? 0,
    options: options.map((option) => shownOption(head.block, option)),
    nodes: nodes.map(({ id, label, values }) => ({
      id,
      label,
      class_nm: Math.round(values.class * 1e10) / 10,
    })),
    assumptions: [...assumptionsOf(options, nodes), ...methodAssumptions(cases)],
    cases,
    answer: answerOf(cases, options, nodes),
  }
}

/** The case of an option in a node. */
export function caseOf(scenario: Scenario, option: OptionInput, node: Node): Case {
  return { block: scenario.head.block, settings: option.settings, node: node.values, rules: option.rules }
}

/** Evaluates one option in one node. */
export function evaluateCase(plain: Case, option: OptionInput, node: Node, about: About): CaseResult {
  const given = { ...plain, kept: plain.kept ?? keeping() }
  const asking = askedOf(given)
  const points = casePoints(given.settings, given.node)
  const typical = outcomesAt(given, asking, points.typical)
  const { worst, ends } = judged(given, asking, option.provenance)
  const explain = about.explain ? explaining(given, givenLeaves(option.provenance, node.provenance)) : null
  const computed = flatChecks(asking).map(({ block, check }, k) => {
    const spec = asking.blocks[block]!.block
    const { at, outcome } = worst[k]!
    const steps = explain === null ? [] : explain(spec, check, at)
    const { title, quantity, unit, sense, name, yesNo } = spec.checks[check]!
    const result: CheckResult = {
      id: `${spec.id}.${name}`,
      subBlock: spec.id,
      title,
      quantity,
      required: outcome.required,
      available: outcome.available,
      unit,
      sense,
      margin: outcome.margin,
      typicalMargin: typical[k]!.margin,
      verdict: verdictOf(outcome.margin, given.settings.guard),
      operatingPoint: shownPoint(given, worst[k]!),
      basis: outcome.basis,
      ...(outcome.rule === undefined ? {} : { rule: outcome.rule }),
      ...(outcome.derived === undefined ? {} : { derived: outcome.derived }),
      ...reasonOf(outcome),
      ...(yesNo === undefined ? {} : { yesNo }),
      steps,
    }
    return capped(result, ends[k] ?? [])
  })
  const checks = [...computed, ...laterChecks(given)]
  return {
    option: option.id,
    node: node.id,
    verdict: caseVerdict(checks),
    margin: limitingCheck(checks)?.margin ?? null,
    limitedBy: limitingCheck(checks)?.id ?? null,
    notExamined: [...asking.notExamined, ...laterNotExamined(given)],
    checks,
    results: { ...resultsOf(given, asking, points, worst), ...laterResults(given) },
    clocking: about.explain ? clockingShown(given, points.judged) : null,
  }
}

/** Above this ratio a disagreement of the rule and the derived demand is pointed out. */
const DISAGREEMENT = 1.6

/** The outcome's own reason, and a remark when its two demands are far apart. */
function reasonOf({ reason, rule, derived }: Outcome): { readonly reason?: string } {
  const [a, b] = [rule?.required ?? null, derived?.required ?? null]
  const ratio = a === null || b === null ? 1 : Math.max(a / b, b / a)
  const apart = ratio > DISAGREEMENT ? `rule and derived demand differ ${ratio.toFixed(1)} times` : undefined
  const words = [reason, apart].filter((part) => part !== undefined)
  return words.length === 0 ? {} : { reason: words.join('; ') }
}

function flatChecks(asking: Asking): readonly { readonly block: number; readonly check: number }[] {
  return asking.blocks.flatMap(({ checks }, block) => checks.map((check) => ({ block, check })))
}

/** A passing check that fails at an end of an uncertain input is capped at tight and says which end. */
function capped(check: CheckResult, ends: readonly FailingEnd[]): CheckResult {
  if (ends.length === 0 || check.margin === null || check.margin < 1) return check
  const said = ends.map(
    ({ path, end, margin }) => `fails at the ${end} end of ${path} (margin ${margin.toFixed(2)})`,
  )
  const reason = [check.reason, ...said].filter((part) => part !== undefined).join('; ')
  return { ...check, reason, verdict: check.verdict === 'pass' ? 'tight' : check.verdict }
}

function shownPoint(given: Case, { at, outcome }: Worst): OperatingPointShown | null {
  if (outcome.margin === null) return null
  const { stack, V_core } = benchAt(given, at, PLAIN)
  return {
    corner: at.corner,
    temperature_K: at.T,
    supply_V: outcome.supply ?? (stack.missing === undefined ? stack.V : V_core),
  }
}

/** Named results of every sub-block, at the operating point that decides its first check. */
function resultsOf(
  given: Case,
  asking: Asking,
  points: CasePoints,
  worst: readonly Worst[],
): Readonly<Record<string, NamedValue>> {
  const results: Record<string, NamedValue> = {}
  let k = 0
  for (const { block, checks } of asking.blocks) {
    const at = shownAt(given, block, checks.length > 0 ? worst[k]?.at : undefined, points)
    for (const { name, ...value } of block.results(benchAt(given, at, PLAIN))) results[name] = value
    k += checks.length
  }
  return results
}

/** Where the results of a sub-block are shown: at its worst point by its own measure, else by its first check. */
function shownAt(
  given: Case,
  { worseBy }: AnySubBlock,
  byCheck: OperatingPoint | undefined,
  { judged, typical }: CasePoints,
): OperatingPoint {
  if (worseBy === null) return byCheck ?? typical
  const measured = judged.map((at) => ({ at, by: worseBy(benchAt(given, at, PLAIN)) }))
  return measured.reduce((worst, one) => (one.by > worst.by ? one : worst)).at
}

function shownOption(block: 'link' | 'clock', { id, label, settings }: OptionInput): OptionShown {
  const link = block === 'link'
  return {
    id,
    label,
    dataRate_bps: link ? settings.data_rate : null,
    symbolRate_Bd: link ? ratesOf({ block, settings }, PLAIN).f_B : null,
    modulation: link ? settings.modulation : null,
    clocking: link ? settings.clocking : null,
  }
}
