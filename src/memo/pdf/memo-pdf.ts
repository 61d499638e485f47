import { joinedBytes } from '../bytes.ts'
import type { MemoModel } from '../model/memo-model.ts'
import { writeAssumptions } from './assumptions.ts'
import { writeChecks } from './checks.ts'
import { writeClocking } from './clocking.ts'
import { writeAppendix, writeCautions } from './closing.ts'
import { writeDerivations } from './derivations.ts'
import { writeFigures } from './figures.ts'
import { writeAnswer, writeTitleBlock } from './front.ts'
import { writeHeadroom } from './headroom.ts'
import { writeGaps, writeLimits } from './limits.ts'
import type { FontName } from './lines.ts'
import { PAPER, type Paper, Sheet } from './sheet.ts'

/** Gives the bytes of a font file when it is needed. */
export type Fonts = (name: FontName) => Uint8Array

/** What the document's properties say. */
export interface About {
  readonly tool: string
  /** YYYY-MM-DD, or null when the memo carries no date. */
  readonly date: string | null
  readonly authors: readonly string[]
}

/** Stands for a date that was not given, so that the same input gives the same bytes. */
const NO_DATE = '2000-01-01'

/**
 * The memo as a tagged PDF with outline, embedded fonts and page numbers.
 *
 * @param model what the memo says
 * @param about properties of the document
 * @param fonts bytes of the font files
 * @param paper size of the pages
 */
export async function memoPdf(
  model: MemoModel,
  about: About,
  fonts: Fonts,
  paper: Paper,
): Promise<Uint8Array> {
  const { default: PDFDocument } = await import('pdfkit')
  const doc = new PDFDocument({
    size: [...PAPER[paper]],
    margin: 0,
    pdfVersion: '1.7',
    tagged: true,
    lang: 'en-GB',
    displayTitle: true,
    bufferPages: true,
    autoFirstPage: false,
    info: properties(model, about),
  })
  const names: readonly FontName[] = ['sans', 'bold', 'mono']
  for (const name of names) doc.registerFont(name, fonts(name))
  const sheet = new Sheet(doc)
  writeMemo(sheet, model)
  sheet.finish(model.title)
  doc.end()
  return collected(doc)
}

function properties(model: MemoModel, { tool, date, authors }: About): PDFKit.DocumentInfo {
  const day = new Date(`${date ?? NO_DATE}T00:00:00Z`)
  return {
    Title: model.title,
    Subject: 'Feasibility memo',
    Author: authors.join(', '),
    Creator: tool,
    Producer: 'pdfkit',
    CreationDate: Number.isNaN(day.getTime()) ? new Date(`${NO_DATE}T00:00:00Z`) : day,
  }
}

async function collected(doc: AsyncIterable<Uint8Array | string>): Promise<Uint8Array> {
  const parts: Uint8Array[] = []
  for await (const part of doc) parts.push(part as Uint8Array)
  return joinedBytes(parts)
}

function writeMemo(sheet: Sheet, model: MemoModel): void {
  writeTitleBlock(sheet, model)
  const sections = [
    writeAnswer,
    writeLimits,
    writeGaps,
    writeFigures,
    writeHeadroom,
    writeClocking,
    writeCautions,
    writeChecks,
    writeAssumptions,
    writeDerivations,
    writeAppendix,
  ]
  for (const write of sections) sheet.inside('Sect', () => write(sheet, model))
}
