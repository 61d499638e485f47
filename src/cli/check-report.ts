import { clean } from '../memo/text/clean.ts'
import { marginText } from '../memo/text/margin.ts'
import type { CaseResult, CheckResult, Result } from '../verdict/result.ts'
import { gridLines } from './grid.ts'
import type { Paint } from './paint.ts'
import { shownValue } from './shown.ts'
import { wrapped } from './wrapped.ts'

const INDENT = '  '
const HANGING = '      '

function title({ scenario, tool }: Result): readonly string[] {
  const about = [
    scenario.revision === null ? '' : `revision ${scenario.revision}`,
    scenario.date ?? '',
    `${tool.name} ${tool.version}`,
  ]
  return [
    `${clean(scenario.title)} (${about
      .filter((part) => part !== '')
      .map(clean)
      .join(', ')})`,
  ]
}

/** Corner, temperature and supply a check was judged at. */
export function pointText({ operatingPoint: at }: CheckResult): string {
  if (at === null) return ''
  return `${at.corner}, ${shownValue(at.temperature_K, 'K', '°C')}, ${shownValue(at.supply_V, 'V')}`
}

/** `transit frequency needs 140 GHz, has 116 GHz`, or `allows …, is …` where less is better. */
export function comparison(check: CheckResult): string {
  const { required, available, unit, sense, quantity } = check
  if (check.yesNo === true)
    return `${quantity}: ${check.verdict === 'fail' ? 'no' : 'yes'}${check.reason === undefined ? '' : `, ${check.reason}`}`
  const [needs, has] = sense === 'at least' ? ['needs', 'has'] : ['may be', 'is']
  return `${quantity} ${needs} ${shownValue(required, unit)}, ${has} ${shownValue(available, unit)}`
}

function limitLine(one: CaseResult, guard: number, width: number, paint: Paint): string {
  const limit = one.checks.find(({ id }) => id === one.limitedBy)
  const head = `${one.option} in ${one.node}`
  if (limit === undefined)
    return wrapped(clean(`${head}: no check could be computed`), width, INDENT, HANGING)
  const at = pointText(limit)
  const margin = `margin\u00a0${marginText(limit.margin, guard)}\u00a0${limit.verdict}`
  const text = `${head}: ${limit.title}; ${comparison(limit)}${at === '' ? '' : ` at ${at}`}; ${margin}`
  const lines = wrapped(clean(text), width, INDENT, HANGING)
  return `${lines.slice(0, -limit.verdict.length)}${paint(limit.verdict, limit.verdict)}`
}

/** Cases that share something, told briefly. */
function told(cases: readonly string[], all: number): string {
  if (cases.length === all) return 'every case'
  return cases.length <= 4 ? cases.join(', ') : `${cases.slice(0, 3).join(', ')} and ${cases.length - 3} more`
}

interface Remark {
  readonly text: string
  readonly case: string
}

/** One line a remark, followed by the cases it holds for. */
function grouped(remarks: readonly Remark[], all: number, width: number): readonly string[] {
  const cases = new Map<string, string[]>()
  for (const remark of remarks) cases.set(remark.text, [...(cases.get(remark.text) ?? []), remark.case])
  return [...cases].map(([text, names]) =>
    wrapped(clean(`${text} [${told([...new Set(names)], all)}]`), width, INDENT, HANGING),
  )
}

function unknowns(result: Result): readonly Remark[] {
  return result.cases.flatMap((one) =>
    one.checks
      .filter(({ verdict }) => verdict === 'unknown')
      .map((check) => ({
        text: `${check.title}: ${check.reason ?? 'no reason stated'}`,
        case: `${one.option} in ${one.node}`,
      })),
  )
}

function notExamined(result: Result): readonly Remark[] {
  return result.cases.flatMap((one) =>
    one.notExamined.map(({ title: what, reason }) => ({
      text: `${what}: ${reason}`,
      case: `${one.option} in ${one.node}`,
    })),
  )
}

const section = (heading: string, lines: readonly string[]): readonly string[] =>
  lines.length === 0 ? [] : ['', heading, ...lines]

/**
 * What `check` prints: title, answer, verdict grid, what limits each case, what is unknown and what was not
 * examined.
 *
 * @param result a result of the contract
 * @param width columns of the terminal
 * @param paint colour by verdict; the words stand without it
 */
export function checkReport(result: Result, width: number, paint: Paint): string {
  const { scenario, answer, cases, guard } = result
  const question = scenario.question === null ? [] : [wrapped(clean(scenario.question), width)]
  const partly = cases.some(({ verdict, margin }) => verdict === 'unknown' && margin !== null)
  const legend = `Verdict and margin: 1.00 is break-even, a pass needs ${(1 + guard).toFixed(2)}.${partly ? ' Beside unknown stands the smallest margin of what could be computed.' : ''}`
  return [
    ...title(result),
    ...question,
    '',
    wrapped(clean(answer.sentence), width),
    '',
    ...gridLines(result, width, paint),
    wrapped(legend, width),
    ...section(
      'What limits each case',
      cases.map((one) => limitLine(one, guard, width, paint)),
    ),
    ...section('Asked, but unknown', grouped(unknowns(result), cases.length, width)),
    ...section('Not examined', grouped(notExamined(result), cases.length, width)),
  ].join('\n')
}
