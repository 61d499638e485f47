import type { CaseResult, Result } from '../../verdict/result.ts'
import { marginStrip } from '../figure/margin-strip.ts'
import { speedBars } from '../figure/speed-bars.ts'
import { clean } from '../text/clean.ts'
import { marginText } from '../text/margin.ts'
import type { QuantityText } from '../text/quantity.ts'
import { anchor } from './anchor.ts'
import { answerSentences, verdictKey } from './answer.ts'
import { assumptionCount, assumptionGroups } from './assumptions.ts'
import { caseName } from './case-names.ts'
import { CAUTIONS, SIGNATURES } from './cautions.ts'
import { checkRow, type FirstShown } from './checks.ts'
import { clockingGroups, JITTER_COLUMNS, PARTS_COLUMNS } from './clocking.ts'
import { derivationGroups } from './derivations.ts'
import { notExaminedRows, unknownRows } from './gaps.ts'
import { headroomGroups } from './headroom.ts'
import { gridRows, limitRow } from './limits.ts'
import type { CaseSection, MemoModel } from './memo-model.ts'
import { nodeKeyRows } from './node-keys.ts'
import { SourceList, StepBook } from './steps.ts'
import { shortFile, titleFacts } from './title-block.ts'

/**
 * Everything the memo says, from the result alone.
 *
 * @param result the evaluated scenario, SI
 * @param writeQuantity writes an SI value with its unit
 */
export function makeModel(result: Result, writeQuantity: QuantityText): MemoModel {
  const write = unbroken(writeQuantity)
  const { scenario, guard } = result
  const sources = new SourceList()
  const book = new StepBook(sources, write)
  const notExamined = notExaminedRows(result)
  const cases = result.cases.map((given) => caseSection(given, guard, book, write))
  return {
    title: clean(scenario.title) || 'Feasibility memo',
    question: scenario.question === null ? null : clean(scenario.question),
    notes: scenario.notes === null ? null : clean(scenario.notes),
    facts: titleFacts(result),
    answer: answerSentences(result, notExamined.length),
    verdictKey: verdictKey(guard),
    nodes: result.nodes.map(({ id, label }) => ({ id: clean(id), label: clean(label) })),
    grid: gridRows(result, write),
    limits: result.cases.map((given) => limitRow(given, guard, write)),
    notExamined,
    unknown: unknownRows(result),
    speed: speedBars(result),
    margins: marginStrip(result),
    headroom: headroomGroups(result, write),
    clocking: clockingGroups(result, write),
    clockingJitterColumns: JITTER_COLUMNS,
    clockingPartsColumns: PARTS_COLUMNS,
    cases,
    assumptions: assumptionGroups(result, write),
    assumptionCount: assumptionCount(result),
    nodeKeys: nodeKeyRows(result, sources, write),
    derivations: derivationGroups(result, guard, book),
    sources: sources.all,
    cautions: CAUTIONS,
    signatures: SIGNATURES,
    inputs: result.inputs.map(({ file, sha256 }) => ({ file: shortFile(file), sha256: clean(sha256) })),
  }
}

function caseSection(given: CaseResult, guard: number, book: StepBook, write: QuantityText): CaseSection {
  const place = anchor('case', given.option, given.node)
  const first: FirstShown = new Map()
  return {
    anchor: place,
    name: caseName(given),
    option: clean(given.option),
    node: clean(given.node),
    verdict: given.verdict,
    margin: marginText(given.margin, guard),
    checks: given.checks.map((check) => checkRow(check, place, guard, first, book, write)),
  }
}

/** A number and its unit stay on one line. */
function unbroken(write: QuantityText): QuantityText {
  return (...quantity) => write(...quantity).replace(/ /g, '\u00a0')
}
