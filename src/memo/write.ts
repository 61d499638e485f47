import { formatQuantity } from '../quantity/format.ts'
import type { Result } from '../verdict/result.ts'
import { bytesOf } from './bytes.ts'
import { assumptionsCsv, checksCsv } from './csv.ts'
import type { Templates } from './html/page.ts'
import { resultJson } from './json.ts'
import { makeModel } from './model/make-model.ts'
import type { MemoModel } from './model/memo-model.ts'
import type { Fonts } from './pdf/memo-pdf.ts'
import type { Paper } from './pdf/sheet.ts'

export type MemoFormat = 'html' | 'pdf' | 'json' | 'csv'

/** What a memo is made with besides the result. */
export interface MemoResources {
  /** `memo` and its partials by name, as text. */
  readonly templates: Templates
  readonly fonts: Fonts
  readonly paper: Paper
}

/** One file of a memo: the ending of its name and what stands in it. */
export interface MemoFile {
  readonly ending: string
  /** Stretches of bytes, to be written one after another; made as they are asked for where the whole is large. */
  readonly content: Iterable<Uint8Array>
}

/**
 * The memo of a result in each format. The same result gives the same bytes.
 *
 * @param result evaluated with derivations, SI
 * @param formats in which order the files come
 * @param resources templates, fonts and paper
 * @returns one file a format, and with `csv` a second one with the assumptions
 */
export async function makeMemo(
  result: Result,
  formats: readonly MemoFormat[],
  resources: MemoResources,
): Promise<readonly MemoFile[]> {
  const isLaidOut = formats.some((format) => format === 'html' || format === 'pdf')
  const model = isLaidOut ? makeModel(result, formatQuantity) : null
  const made: MemoFile[] = []
  for (const format of formats) made.push(...(await filesOf(format, result, model, resources)))
  return made
}

async function filesOf(
  format: MemoFormat,
  result: Result,
  model: MemoModel | null,
  { templates, fonts, paper }: MemoResources,
): Promise<readonly MemoFile[]> {
  const tool = `${result.tool.name} ${result.tool.version}`
  if (format === 'json') return [{ ending: 'json', content: resultJson(result) }]
  if (format === 'csv') {
    return [
      { ending: 'csv', content: [bytesOf(checksCsv(result))] },
      { ending: 'assumptions.csv', content: [bytesOf(assumptionsCsv(result))] },
    ]
  }
  if (model === null) return []
  if (format === 'html') {
    const { toHtml } = await import('./html/page.ts')
    return [{ ending: 'html', content: [bytesOf(await toHtml(model, templates, tool))] }]
  }
  const { memoPdf } = await import('./pdf/memo-pdf.ts')
  const about = { tool, date: result.scenario.date, authors: result.scenario.authors }
  return [{ ending: 'pdf', content: [await memoPdf(model, about, fonts, paper)] }]
}
