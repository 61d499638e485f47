import type { GridCell, GridRow, MemoModel } from '../model/memo-model.ts'
import { PAINT } from '../text/verdict.ts'
import { piece } from './lines.ts'
import type { Sheet } from './sheet.ts'
import { plainText, quiet, strong } from './styles.ts'
import { type Cell, cell, drawTable } from './table.ts'

/** More nodes than this would make the columns of the grid too narrow for their words. */
const NODES_ABREAST = 7

/** Title block: what was asked, by whom, when, with what. */
export function writeTitleBlock(sheet: Sheet, { title, question, facts }: MemoModel): void {
  sheet.paragraph('Feasibility memo', quiet(9), 0, 'P', 2)
  sheet.heading(1, title)
  if (question !== null) sheet.paragraph(question, plainText(11), 0, 'P', 8)
  drawTable(sheet, {
    caption: 'Title block',
    columns: facts.map(({ label }) => ({ title: label })),
    rows: [facts.map(({ text }) => cell(text, plainText(8)))],
    size: 7,
    hasRowHeads: false,
  })
}

/** The answer, the verdict grid and how to read it. */
export function writeAnswer(sheet: Sheet, { answer, grid, nodes, verdictKey, notes }: MemoModel): void {
  sheet.heading(2, 'Answer')
  for (const [k, text] of answer.entries()) sheet.paragraph(text, k === 0 ? strong(9.5) : plainText(9.5))
  sheet.y += 4
  for (let from = 0; from < nodes.length; from += NODES_ABREAST) drawGrid(sheet, grid, nodes, from)
  sheet.paragraph(verdictKey, quiet(7.5), 0, 'P', 6)
  if (notes !== null) sheet.paragraph([piece('Notes. ', strong(8.5)), piece(notes, plainText(8.5))])
}

function drawGrid(sheet: Sheet, grid: readonly GridRow[], nodes: MemoModel['nodes'], from: number): void {
  const shown = nodes.slice(from, from + NODES_ABREAST)
  const share = 0.81 / Math.min(NODES_ABREAST, nodes.length)
  drawTable(sheet, {
    caption: 'Verdict of every option in every node, with the smallest known margin and what limits it',
    columns: [{ title: 'Option', share: 0.19 }, ...shown.map(({ id }) => ({ title: id, share }))],
    rows: grid.map(({ option, about, cells }) => [
      { text: [piece(option, strong(7.5))], below: [[piece(about, quiet(6.5))]] },
      ...cells.slice(from, from + NODES_ABREAST).map(gridCell),
    ]),
    size: 7.5,
    pad: 3.4,
  })
}

function gridCell({ verdict, margin, limit }: GridCell): Cell {
  const paint = PAINT[verdict]
  const ink = { colour: paint.ink }
  return {
    paint,
    text: [piece(`${paint.sign} ${verdict}`, { ...strong(7), ...ink })],
    below: [
      [piece(margin, { ...strong(8.5), ...ink })],
      ...(limit === '' ? [] : [[piece(limit, { ...plainText(5.8), ...ink })]]),
    ],
  }
}
