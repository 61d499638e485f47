import type { MemoModel } from '../model/memo-model.ts'
import { piece } from './lines.ts'
import type { Sheet } from './sheet.ts'
import { code, plainText } from './styles.ts'
import { cell, drawTable } from './table.ts'

/** What the memo does not replace, and who signs. */
export function writeCautions(sheet: Sheet, { cautions, signatures }: MemoModel): void {
  sheet.notice('Cautions')
  writeList(
    sheet,
    cautions.map((text) => ({ label: '•', text })),
    8,
  )
  sheet.heading(2, 'Sign-off', 140)
  const blank = cell('', plainText(8))
  drawTable(sheet, {
    caption: 'Signatures',
    columns: [
      { title: 'Role', share: 0.19 },
      { title: 'Name', share: 0.27 },
      { title: 'Date', share: 0.2 },
      { title: 'Signature', share: 0.34 },
    ],
    rows: signatures.map((role) => [cell(role, plainText(8)), blank, blank, blank]),
    size: 8,
    rowHeight: 30,
  })
}

/** Input files with their full hashes, and the numbered sources. */
export function writeAppendix(sheet: Sheet, { inputs, sources }: MemoModel): void {
  sheet.heading(2, 'Inputs and sources')
  sheet.heading(3, 'Input files', 20)
  for (const { file, sha256 } of inputs) {
    sheet.paragraph(
      [piece(`${file}  SHA-256 `, plainText(7.5)), piece(sha256, code(7))],
      plainText(7.5),
      0,
      'P',
      1,
    )
  }
  if (inputs.length === 0) sheet.paragraph('None recorded.')
  sheet.heading(3, 'Sources', 20)
  writeList(
    sheet,
    sources.map((text, k) => ({ label: `${k + 1}.`, text })),
    7,
  )
}

interface Item {
  readonly label: string
  readonly text: string
}

function writeList(sheet: Sheet, items: readonly Item[], size: number): void {
  sheet.inside('L', () => {
    for (const { label, text } of items) sheet.item(label, text, plainText(size), size * 2.6)
  })
  sheet.y += 4
}
