import type { MemoModel, NotExaminedRow, UnknownRow } from '../model/memo-model.ts'
import type { Sheet } from './sheet.ts'
import { plainText, stackedCell, verdictCell } from './styles.ts'
import { cell, drawTable } from './table.ts'

const SIZE = 6.5

/** What limits each case, where, and what would limit it next. */
export function writeLimits(sheet: Sheet, { limits }: MemoModel): void {
  sheet.heading(2, 'What limits each case')
  const style = plainText(SIZE)
  drawTable(sheet, {
    caption: 'The check with the smallest margin, where it is worst, and the one that would limit next',
    columns: [
      { title: 'Case', share: 0.125 },
      { title: 'Verdict', share: 0.105 },
      { title: 'Limiting check', share: 0.195 },
      { title: 'Required', share: 0.085, align: 'right' },
      { title: 'Available', share: 0.085, align: 'right' },
      { title: 'Margin', share: 0.07, align: 'right' },
      { title: 'Operating point', share: 0.165 },
      { title: 'Next', share: 0.17 },
    ],
    rows: limits.map((row) => [
      cell(`${row.option} in ${row.node}`, style),
      verdictCell(row.verdict, SIZE),
      stackedCell(row.title, [row.note], SIZE),
      cell(row.required, style),
      cell(row.available, style),
      cell(row.margin, style),
      cell(row.at, style),
      cell(row.next, style),
    ]),
    size: SIZE,
    pad: 1.6,
  })
}

/** What nobody asked and what could not be answered, where nobody can miss it. */
export function writeGaps(sheet: Sheet, { notExamined, unknown }: MemoModel): void {
  sheet.notice('Not examined')
  if (notExamined.length === 0) sheet.paragraph('Nothing that this planner knows of was left out.')
  else {
    sheet.paragraph(
      'The verdicts above say nothing about these subjects, because the scenario does not ask for them.',
    )
    drawGaps(sheet, 'Subjects that were not examined', 'Subject', notExamined)
  }
  sheet.notice('Unknown')
  if (unknown.length === 0) sheet.paragraph('Every check that was asked could be computed.')
  else {
    sheet.paragraph('These checks were asked and could not be computed. None of them counts as a pass.')
    drawGaps(sheet, 'Checks that could not be computed', 'Check', unknown)
  }
}

function drawGaps(
  sheet: Sheet,
  caption: string,
  subject: string,
  rows: readonly (NotExaminedRow | UnknownRow)[],
): void {
  const style = plainText(7.5)
  drawTable(sheet, {
    caption,
    columns: [
      { title: subject, share: 0.3 },
      { title: 'Why', share: 0.4 },
      { title: 'Where', share: 0.3 },
    ],
    rows: rows.map(({ title, reason, cases }) => [
      cell(title, style),
      cell(reason, style),
      cell(cases, style),
    ]),
    size: 7.5,
  })
}
