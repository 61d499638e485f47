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
    'Every clock is shown at the operating point at which it jitters most. Figures show the node that comes closest to passing; the tables show all.',
  )
  for (const { title, words, figures, jitter, parts } of clocking) {
    sheet.heading(3, title, roomFor(sheet, figures[0]) + 40)
    for (const text of words) sheet.paragraph(text)
    for (const figure of figures) drawFigure(sheet, figure)
    rowsOf(sheet, `Jitter of ${title}`, clockingJitterColumns, jitter)
    sheet.paragraph(
      'Loop filter, and random jitter of the loop at half and twice the best bandwidth, before any tracking:',
      quiet(7.5),
      0,
      'P',
      3,
    )
    rowsOf(sheet, `Loop of ${title}`, clockingPartsColumns, parts)
  }
}

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
