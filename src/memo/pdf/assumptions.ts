import type { AssumptionRow, MemoModel, NodeKeyRow } from '../model/memo-model.ts'
import { piece } from './lines.ts'
import type { Sheet } from './sheet.ts'
import { code, plainText, quiet, strong } from './styles.ts'
import { type Cell, cell, drawTable } from './table.ts'

const SIZE = 6
/** More nodes side by side would make their columns too narrow. */
const ABREAST = 7

/** Every value used, with where it came from; what nobody stated or measured is marked. */
export function writeAssumptions(sheet: Sheet, model: MemoModel): void {
  sheet.heading(2, 'Assumptions')
  sheet.paragraph(`${model.assumptionCount} These are set in bold.`)
  for (const { title, rows } of model.assumptions) {
    if (title.startsWith('Node ')) continue
    sheet.heading(3, title)
    drawTable(sheet, {
      caption: `Assumptions: ${title}`,
      columns: [
        { title: 'Key', share: 0.25 },
        { title: 'Value (low … high)', share: 0.2 },
        { title: 'From', share: 0.23 },
        { title: 'Source', share: 0.32 },
      ],
      rows: rows.map(assumptionCells),
      size: SIZE,
      pad: 1.4,
    })
  }
  writeNodes(sheet, model)
}

function assumptionCells({
  path,
  value,
  spread,
  origin,
  evidence,
  marks,
  source,
}: AssumptionRow): readonly Cell[] {
  const style = plainText(SIZE)
  return [
    cell(path, code(SIZE - 0.5)),
    cell(spread === '' ? value : `${value} (${spread})`, style),
    { text: [piece(`${origin}, ${evidence}`, marks === '' ? style : strong(SIZE))] },
    cell(source, style),
  ]
}

function writeNodes(sheet: Sheet, { nodeKeys, nodes }: MemoModel): void {
  if (nodeKeys.length === 0) return
  sheet.heading(3, 'Nodes')
  sheet.paragraph('Numbers in square brackets refer to the list of sources at the end.')
  for (let from = 0; from < nodes.length; from += ABREAST) {
    const shown = nodes.slice(from, from + ABREAST)
    const share = 0.81 / shown.length
    drawTable(sheet, {
      caption: `Assumptions: nodes ${shown.map(({ id }) => id).join(', ')}`,
      columns: [{ title: 'Key', share: 0.19 }, ...shown.map(({ id }) => ({ title: id, share }))],
      rows: nodeKeys.map(({ key, cells }) => [
        cell(key, code(SIZE - 0.5)),
        ...cells.slice(from, from + ABREAST).map(nodeCell),
      ]),
      size: SIZE,
      pad: 1.4,
    })
  }
}

function nodeCell({ value, evidence, marks, source }: NodeKeyRow['cells'][number]): Cell {
  const small = quiet(SIZE - 0.8)
  const from = marks === '' ? [piece(evidence, small)] : [piece(marks, { ...strong(SIZE - 0.8) })]
  const number = source === 0 ? [] : [piece(` [${source}]`, small)]
  const below = evidence === '' ? [] : [[...from, ...number]]
  return { text: [piece(value, plainText(SIZE))], below }
}
