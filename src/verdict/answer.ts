import type { Node } from '../nodes/node.ts'
import type { OptionInput } from '../scenario/checked.ts'
import type { Answer, CaseResult, Verdict } from './result.ts'
import { caseVerdict } from './verdict.ts'

/** The answer in two or three sentences, and the cases by verdict. */
export function answerOf(
  cases: readonly CaseResult[],
  options: readonly Pick<OptionInput, 'id' | 'label'>[],
  nodes: readonly Pick<Node, 'id'>[],
): Answer {
  const named = (verdict: Verdict): readonly string[] =>
    cases.filter((one) => one.verdict === verdict).map(({ option, node }) => `${option} in ${node}`)
  const byOption = options.map((option) => optionPart(option, cases, nodes)).join('; ')
  const sentence = [headline(cases, options), `${byOption}.`, unknownSentence(cases)]
  return {
    sentence: sentence.filter((part) => part !== '').join(' '),
    passes: named('pass'),
    tight: named('tight'),
    fails: named('fail'),
    unknown: named('unknown'),
  }
}

function headline(cases: readonly CaseResult[], options: readonly { readonly id: string }[]): string {
  const count = (verdict: Verdict): number => cases.filter((one) => one.verdict === verdict).length
  const parts = [
    [count('pass'), 'pass', 'passes'],
    [count('tight'), 'are tight', 'is tight'],
    [count('fail'), 'fail', 'fails'],
    [count('unknown'), 'are undecided', 'is undecided'],
  ] as const
  const said = parts
    .filter(([many]) => many > 0)
    .map(([many, what, one]) => `${many} ${many === 1 ? one : what}`)
  const what = options.length === 1 ? 'nodes' : 'combinations of option and node'
  return `Of ${cases.length} ${what}, ${listed(said)}:`
}

/** Verdict of what could be computed: what a case would be without its unknown checks. */
function computedVerdict(one: CaseResult): Verdict {
  return caseVerdict(one.checks.filter(({ verdict }) => verdict !== 'unknown'))
}

/** Where one option works or is undecided, or what stops it where it comes closest. */
function optionPart(
  option: { readonly id: string },
  cases: readonly CaseResult[],
  nodes: readonly { readonly id: string }[],
): string {
  const own = nodes.flatMap(({ id }) => cases.filter((one) => one.option === option.id && one.node === id))
  const inNodes = (verdict: Verdict, computed: Verdict = verdict): readonly string[] =>
    own.filter((one) => one.verdict === verdict && computedVerdict(one) === computed).map(({ node }) => node)
  const parts = [
    ['passes in', inNodes('pass'), ''],
    ['is tight in', inNodes('tight'), ''],
    ['is undecided in', inNodes('unknown', 'pass'), ', passing as far as computed'],
    ['is undecided in', inNodes('unknown', 'tight'), ', tight as far as computed'],
    ['is undecided in', inNodes('unknown', 'unknown'), ', with nothing computed'],
  ] as const
  const said = parts.flatMap(([how, where, rest]) =>
    where.length === 0 ? [] : [`${how} ${listed(where)}${rest}`],
  )
  return said.length > 0 ? `${option.id} ${listed(said)}` : `${option.id} ${closest(own)}`
}

/** What stops an option that works nowhere, where it comes closest. */
function closest(own: readonly CaseResult[]): string {
  const known = own.filter((one) => one.margin !== null)
  if (known.length === 0) return 'has no computed check'
  const best = known.reduce((a, b) => (b.margin! > a.margin! ? b : a))
  const limit = best.checks.find(({ id }) => id === best.limitedBy)
  const where =
    own.length === 1 ? `fails in ${best.node}` : `fails in every node, and comes closest in ${best.node}`
  return `${where}, limited by ${limit?.title ?? 'an unknown check'} (margin ${best.margin!.toFixed(2)})`
}

function unknownSentence(cases: readonly CaseResult[]): string {
  const asked = new Set(
    cases.flatMap(({ checks }) =>
      checks.filter(({ verdict }) => verdict === 'unknown').map(({ title }) => title),
    ),
  )
  return asked.size === 0 ? '' : `Asked but unknown: ${listed([...asked])}.`
}

/** "a", "a and b", "a, b and c". */
export function listed(parts: readonly string[]): string {
  if (parts.length <= 1) return parts[0] ?? ''
  return `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}`
}
