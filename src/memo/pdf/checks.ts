import type { CaseSection, CheckRow, MemoModel } from '../model/memo-model.ts'
import { PAINT } from '../text/verdict.ts'
import { piece } from './lines.ts'
import type { Sheet } from './sheet.ts'
import { plainText, quiet, strong } from './styles.ts'
import { type Cell, cell, drawTable } from './table.ts'

const SIZE = 6
/** More cases side by side would make their columns too narrow. */
const ABREAST = 7

/** Every check of every case, compact: one table an option, checks down, nodes across. */
export function writeChecks(sheet: Sheet, { cases, grid }: MemoModel): void {
  sheet.heading(2, 'All checks')
  sheet.paragraph(
    'One table for each option. A cell gives verdict and margin at the worst operating point, then the margin at the typical one, then what is required and available at the worst. Advisory checks are shown and do not move the verdict. Operating points, what governs, and both routes of every demand, rule and derived, stand in the HTML, JSON and CSV of this memo.',
  )
  const options = [...new Set(cases.map(({ option }) => option))]
  options.forEach((option, k) => {
    sheet.heading(3, grid[k]?.option ?? option)
    const own = cases.filter((one) => one.option === option)
    for (let from = 0; from < own.length; from += ABREAST)
      drawChecks(sheet, option, own.slice(from, from + ABREAST))
    writeRemarks(sheet, own)
  })
}

function drawChecks(sheet: Sheet, option: string, cases: readonly CaseSection[]): void {
  const ids = [...new Set(cases.flatMap(({ checks }) => checks.map(({ id }) => id)))]
  const share = 0.82 / cases.length
  drawTable(sheet, {
    caption: `Checks of ${option}`,
    columns: [{ title: 'Check', share: 0.18 }, ...cases.map(({ node }) => ({ title: node, share }))],
    rows: ids.map((id) => {
      const found = cases.map(({ checks }) => checks.find((check) => check.id === id))
      return [nameCell(found.find((check) => check !== undefined)), ...found.map(marginCell)]
    }),
    size: SIZE,
    pad: 1.6,
  })
}

function nameCell(check: CheckRow | undefined): Cell {
  if (check === undefined) return cell('', plainText(SIZE))
  const more = check.advisory ? [[piece('advisory', quiet(SIZE - 0.5))]] : []
  return { text: [piece(check.title, plainText(SIZE))], below: more }
}

const SENSE: Readonly<Record<string, string>> = { 'at least': '≥', 'at most': '≤' }

function marginCell(check: CheckRow | undefined): Cell {
  if (check === undefined) return cell('not asked', quiet(SIZE - 0.5))
  const { verdict, margin, typical, required, available, sense } = check
  const style = verdict === 'pass' ? plainText(SIZE) : strong(SIZE)
  const said = `${PAINT[verdict].sign} ${verdict}`
  if (margin === '–') return { text: [piece(said, style)] }
  const small = quiet(SIZE - 0.6)
  return {
    text: [piece(`${said} ${margin}`, style)],
    below: [
      [piece(`typical ${typical}`, small)],
      [piece(`${SENSE[sense] ?? sense} ${required}; ${available}`, small)],
    ],
  }
}

/** Why checks with margin enough are tight all the same. */
function writeRemarks(sheet: Sheet, cases: readonly CaseSection[]): void {
  const remarks = cases.flatMap(({ node, checks }) =>
    checks
      .filter(({ verdict, reason }) => verdict === 'tight' && reason !== '')
      .map(({ title, reason }) => `${title} in ${node}: ${reason}`),
  )
  if (remarks.length === 0) return
  const size = SIZE
  sheet.paragraph(
    [piece('Remarks. ', strong(size)), piece(`${remarks.join('. ')}.`, quiet(size))],
    quiet(size),
  )
}
