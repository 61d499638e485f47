import { FAINT, INK, SOFT } from '../figure/figure.ts'
import type { Paint } from '../text/verdict.ts'
import { extent, type Line, linesOf, type Piece, piece, type Style } from './lines.ts'
import { type Element, heightOf, type Sheet } from './sheet.ts'

/** One cell: its text, and for verdicts how it is painted. */
export interface Cell {
  readonly text: readonly Piece[]
  /** Further paragraphs below, each on lines of its own. */
  readonly below?: readonly (readonly Piece[])[]
  readonly paint?: Paint
}

export interface Column {
  readonly title: string
  readonly align?: 'left' | 'right'
  /** Share of the width; absent: by content. */
  readonly share?: number
}

export interface Table {
  readonly caption: string
  readonly columns: readonly Column[]
  readonly rows: readonly (readonly Cell[])[]
  readonly size?: number
  /** Least height of a row in points. */
  readonly rowHeight?: number
  /** Room above and below the text of a row in points. */
  readonly pad?: number
  /** Whether the first column names its row; true when absent. */
  readonly hasRowHeads?: boolean
}

const PAD = { x: 3, y: 2.2 }
const padOf = ({ pad }: Table): number => pad ?? PAD.y

/** A text cell. */
export function cell(text: string, style: Style): Cell {
  return { text: [piece(text, style)] }
}

/**
 * Draws a table: cells wrapped to their columns, rows kept whole, the head repeated on every page, tagged row
 * by row with the first column as row header.
 */
export function drawTable(sheet: Sheet, table: Table): void {
  const size = table.size ?? 7
  const head = table.columns.map(({ title }): Cell => cell(title, { font: 'bold', size, colour: INK }))
  const widths = columnWidths(sheet, table, head)
  const lined = (row: readonly Cell[], least = 0): Lined => linedRow(sheet, row, widths, table, least)
  const headLines = lined(head)
  const first = table.rows[0] === undefined ? 0 : lined(table.rows[0], table.rowHeight).height
  sheet.ensure(headLines.height + first + 4)
  const element = sheet.element('Table', { title: table.caption })
  drawRow(sheet, headLines, { table, widths, parent: sheet.element('TR', {}, element), kind: 'head' })
  const tallest = sheet.pageRoom - headLines.height
  for (const row of table.rows) {
    for (const part of divided(lined(row, table.rowHeight), tallest, padOf(table))) {
      if (sheet.room < part.height) {
        sheet.newPage()
        drawRow(sheet, headLines, { table, widths, parent: null, kind: 'head' })
      }
      drawRow(sheet, part, { table, widths, parent: sheet.element('TR', {}, element), kind: 'body' })
    }
  }
  sheet.y += 8
}

const paragraphs = ({ text, below }: Cell): readonly (readonly Piece[])[] => [text, ...(below ?? [])]

interface Lined {
  readonly cells: readonly { readonly lines: readonly Line[]; readonly paint?: Paint }[]
  readonly height: number
}

function linedRow(
  sheet: Sheet,
  row: readonly Cell[],
  widths: readonly number[],
  table: Table,
  least: number,
): Lined {
  const pad = padOf(table)
  const cells = row.map((one, k) => ({
    ...one,
    lines: paragraphs(one).flatMap((text) => linesOf(text, (widths[k] ?? 0) - 2 * PAD.x, sheet.measure)),
  }))
  return { cells, height: Math.max(least, ...cells.map(({ lines }) => heightOf(lines) + 2 * pad)) }
}

/** A row taller than a page in parts that fit; any other as it is. */
function divided(row: Lined, tallest: number, pad: number): readonly Lined[] {
  if (row.height <= tallest) return [row]
  const line = Math.max(...row.cells.flatMap(({ lines }) => lines.map(({ height }) => height)))
  const count = Math.max(1, Math.floor((tallest - 2 * pad) / line))
  const parts = Math.max(...row.cells.map(({ lines }) => Math.ceil(lines.length / count)))
  return Array.from({ length: parts }, (_, k) => {
    const cells = row.cells.map((one) => ({ ...one, lines: one.lines.slice(k * count, (k + 1) * count) }))
    return { cells, height: Math.max(...cells.map(({ lines }) => heightOf(lines))) + 2 * pad }
  })
}

interface RowPlace {
  readonly table: Table
  readonly widths: readonly number[]
  /** Absent for a head that is only repeated. */
  readonly parent: Element | null
  readonly kind: 'head' | 'body'
}

function drawRow(sheet: Sheet, row: Lined, { table, widths, parent, kind }: RowPlace): void {
  const top = sheet.y
  sheet.artifact(() => drawGround(sheet, row, widths, kind))
  let x = sheet.left
  row.cells.forEach(({ lines }, k) => {
    const width = widths[k] ?? 0
    const align = table.columns[k]?.align ?? 'left'
    const draw = (): void => sheet.drawLines(lines, x + PAD.x, top + padOf(table), width - 2 * PAD.x, align)
    if (parent === null) sheet.artifact(draw)
    else {
      const isHead = kind === 'head' || (k === 0 && table.hasRowHeads !== false)
      sheet
        .element(isHead ? 'TH' : 'TD', isHead ? { scope: kind === 'head' ? 'Column' : 'Row' } : {}, parent)
        .add(draw)
    }
    x += width
  })
  sheet.y = top + row.height
}

/** Ground of painted cells, band of the head, line under the row. */
function drawGround(sheet: Sheet, row: Lined, widths: readonly number[], kind: 'head' | 'body'): void {
  const { doc, left, y } = sheet
  const total = widths.reduce((sum, width) => sum + width, 0)
  if (kind === 'head') doc.rect(left, y, total, row.height).fill('#f2f4f7')
  let x = left
  row.cells.forEach(({ paint }, k) => {
    const width = widths[k] ?? 0
    if (paint !== undefined) drawPaint(sheet, paint, x, width, row.height)
    x += width
  })
  const line = y + row.height
  doc
    .lineWidth(0.4)
    .moveTo(left, line)
    .lineTo(left + total, line)
    .stroke(kind === 'head' ? SOFT : FAINT)
}

function drawPaint(
  { doc, y }: Sheet,
  { fill, edge, sign }: Paint,
  x: number,
  width: number,
  height: number,
): void {
  doc.save().lineWidth(0.9)
  if (sign === '?') doc.dash(2.5, { space: 2 })
  doc.rect(x + 1.2, y + 1.2, width - 2.4, height - 2.4).fillAndStroke(fill, edge)
  doc.restore()
}

/** Fixed shares first; the rest by content, no column narrower than its widest word where that is possible. */
function columnWidths(sheet: Sheet, { columns, rows }: Table, head: readonly Cell[]): readonly number[] {
  const fixed = columns.map(({ share }) => (share === undefined ? null : share * sheet.width))
  const free = sheet.width - fixed.reduce<number>((sum, width) => sum + (width ?? 0), 0)
  const extents = columns.map((_, k) => {
    const cells = [head[k]!, ...rows.map((row) => row[k]!)]
    const each = cells.flatMap(paragraphs).map((text) => extent(text, sheet.measure))
    const pad = 2 * PAD.x + 0.5
    return {
      least: Math.min(sheet.width * 0.3, Math.max(...each.map(({ least }) => least)) + pad),
      most: Math.max(...each.map(({ most }) => most)) + pad,
    }
  })
  const open = extents.map((one, k) => ({ ...one, k })).filter(({ k }) => fixed[k] === null)
  const least = open.reduce((sum, one) => sum + one.least, 0)
  const wish = open.reduce((sum, one) => sum + Math.min(one.most, sheet.width * 0.5) - one.least, 0)
  const spread = least > free ? free / least : 1
  return columns.map((_, k) => {
    const given = fixed[k]
    if (given !== null && given !== undefined) return given
    const one = extents[k]!
    if (least > free) return one.least * spread
    const share =
      wish <= 0 ? 1 / open.length : Math.max(0, Math.min(one.most, sheet.width * 0.5) - one.least) / wish
    return one.least + (free - least) * share
  })
}
