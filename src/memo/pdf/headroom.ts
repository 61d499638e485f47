import type { MemoModel } from '../model/memo-model.ts'
import { base, type Runs, sub } from '../text/runs.ts'
import { type Piece, piece, pieces } from './lines.ts'
import type { Sheet } from './sheet.ts'
import { plainText, quiet, verdictCell } from './styles.ts'
import { cell, drawTable } from './table.ts'

const SIZE = 6.3

/** Supply that each stacked stage has and needs, the line that binds, and the design point. */
export function writeHeadroom(sheet: Sheet, { headroom }: MemoModel): void {
  sheet.heading(2, 'Headroom', 130)
  if (headroom.length === 0) {
    sheet.paragraph('No stacked stage was asked for.')
    return
  }
  sheet.paragraph(
    'Supply that each stacked stage has and needs, the line that binds, and below it the device at its design point: the smallest current density that gives the demand with the guard.',
  )
  const style = plainText(SIZE)
  for (const { option, rows } of headroom) {
    sheet.heading(3, option)
    drawTable(sheet, {
      caption: `Headroom of ${option}`,
      columns: [
        { title: 'Node', share: 0.065 },
        { title: 'Sub-block', share: 0.15 },
        { title: 'Verdict', share: 0.085 },
        { title: 'Available', share: 0.085, align: 'right' },
        { title: 'Needed', share: 0.075, align: 'right' },
        { title: 'Spare or missing', share: 0.13, align: 'right' },
        { title: 'Binding line; design point', share: 0.41 },
      ],
      rows: rows.map((row) => [
        cell(row.node, style),
        cell(row.subBlock, style),
        verdictCell(row.verdict, SIZE),
        cell(row.available, style),
        cell(row.needed, style),
        cell(row.spare, style),
        {
          text: [piece(row.binding, style)],
          below: [designPoint(row.design)].filter(({ length }) => length > 0),
        },
      ]),
      size: SIZE,
      pad: 1.4,
    })
  }
}

const NAMES: readonly Runs[] = [
  [base('f'), sub('T')],
  [base('IC')],
  [base('J')],
  [base('V'), sub('GS')],
  [base('V'), sub('DSsat')],
  [base('g'), sub('m'), base('/I'), sub('D')],
  [base('self-gain')],
]

function designPoint(design: readonly string[]): readonly Piece[] {
  const style = quiet(SIZE - 0.5)
  const known = design.flatMap((value, k) => (value === '–' ? [] : [{ value, name: NAMES[k] ?? [] }]))
  return known.flatMap(({ value, name }, k) => [
    ...pieces(name, style),
    piece(` ${value}${k === known.length - 1 ? '' : ', '}`, style),
  ])
}
