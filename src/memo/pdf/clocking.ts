import type { ClockingRow } from '../model/clocking.ts'
import type { MemoModel } from '../model/memo-model.ts'
import { drawFigure, roomFor } from './figures.ts'
import type { Sheet } from './sheet.ts'
import { plainText, quiet } from './styles.ts'
import { cell, drawTable } from './table.ts'

const SIZE = 6.3

/** Phase noise, jitter budget and loop filter of every clock. */
export function writeClocking(sheet: Sheet, model: MemoModel): void {
  const { clocking, clockingJitterColumns, clockingPartsColumns } = model
  sheet.heading(2, 'Clock: phase noise and jitter', 60)
  if (clocking.length === 0) {
    sheet.paragraph(
      'The scenario states no loop, or its clock could not be computed: there is no jitter to show.',
    )
    return
  }
  sheet.paragraph(
    'Every clock is shown at the operating point at which it jitters most. Noise of the loop is integrated over the stated band; the clock path and the aperture count with all their noise. Figures show the node that comes closest to passing; the tables show all.',
  )
  for (const { title, words, figures, jitter, parts } of clocking) {
    sheet.heading(3, title, roomFor(sheet, figures[0]) + 30 + roomForWords(words))
    for (const text of words) sheet.paragraph(text)
    for (const figure of figures) drawFigure(sheet, figure)
    rowsOf(sheet, `Jitter of ${title}`, clockingJitterColumns, jitter)
    sheet.paragraph(
      "Loop filter; then the bandwidth of least jitter, whichever is stated, and the loop's random jitter there, at half and at twice of it, before any tracking:",
      quiet(7.5),
      0,
      'P',
      3,
    )
    rowsOf(sheet, `Loop of ${title}`, clockingPartsColumns, parts)
  }
}

/** About what paragraphs take, so that they stay with the figure behind them. */
const roomForWords = (words: readonly string[]): number =>
  words.reduce((sum, text) => sum + 4 + 12 * Math.ceil(text.length / 95), 0)

function rowsOf(
  sheet: Sheet,
  caption: string,
  columns: readonly string[],
  rows: readonly ClockingRow[],
): void {
  const style = plainText(SIZE)
  drawTable(sheet, {
    caption,
    columns: [{ title: 'Node' }, ...columns.map((title) => ({ title, align: 'right' as const }))],
    rows: rows.map(({ node, cells }) => [cell(node, style), ...cells.map((text) => cell(text, style))]),
    size: SIZE,
    pad: 1.4,
  })
}
