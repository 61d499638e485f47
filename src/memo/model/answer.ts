import type { Result } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'

/** The answer in a few sentences: the engine's own, and what was left out. */
export function answerSentences(result: Result, notExamined: number): readonly string[] {
  const gap =
    notExamined === 0
      ? ''
      : `${notExamined} ${notExamined === 1 ? 'subject was' : 'subjects were'} not examined and ${notExamined === 1 ? 'is' : 'are'} listed below.`
  return [clean(result.answer.sentence), gap].filter((text) => text !== '')
}

/** What the words of the grid mean. */
export function verdictKey(guard: number): string {
  const share = `${Number((guard * 100).toPrecision(3))} %`
  const pass = Number((1 + guard).toPrecision(4))
  return `Margins are ratios; 1.00 is break-even. Pass: ${pass} or more (guard ${share}). Tight: from 1.00 up to the guard. Fail: below 1.00. Unknown: something that was asked could not be computed, so the case is not judged. Each check is taken at its own worst corner, temperature and supply.`
}
