import { clean } from '../memo/text/clean.ts'
import { marginText } from '../memo/text/margin.ts'
import type { CaseResult, Result, Verdict } from '../verdict/result.ts'
import type { Paint } from './paint.ts'

interface Cell {
  readonly verdict: Verdict
  readonly text: string
}

function cellOf(one: CaseResult | undefined, guard: number): Cell {
  if (one === undefined) return { verdict: 'unknown', text: 'unknown' }
  return { verdict: one.verdict, text: `${one.verdict} ${marginText(one.margin, guard)}` }
}

interface Column {
  readonly heading: string
  readonly cells: readonly Cell[]
  readonly width: number
}

function columnsOf(result: Result): readonly Column[] {
  const cases = new Map(result.cases.map((one) => [`${one.option}\n${one.node}`, one]))
  return result.nodes.map(({ id }) => {
    const cells = result.options.map((option) => cellOf(cases.get(`${option.id}\n${id}`), result.guard))
    const heading = clean(id)
    return { heading, cells, width: Math.max(heading.length, ...cells.map(({ text }) => text.length)) }
  })
}

/** Splits the columns into blocks that each fit beside the names of the options. */
function blocksOf(columns: readonly Column[], room: number): readonly (readonly Column[])[] {
  const blocks: Column[][] = []
  let left = 0
  for (const column of columns) {
    const last = blocks.at(-1)
    if (last !== undefined && column.width + 2 <= left) last.push(column)
    else {
      blocks.push([column])
      left = room
    }
    left -= column.width + 2
  }
  return blocks
}

/**
 * Verdict grid, options down and nodes across: word and margin in each cell, wrapped into blocks of nodes when
 * the terminal is narrow.
 *
 * @param result a result of the contract
 * @param width columns of the terminal
 * @param paint colour of a cell
 * @returns lines
 */
export function gridLines(result: Result, width: number, paint: Paint): readonly string[] {
  const names = result.options.map(({ id }) => clean(id))
  const first = Math.max('option'.length, ...names.map((name) => name.length))
  const blocks = blocksOf(columnsOf(result), width - first)
  return blocks.flatMap((block, k) => {
    const heading = block.map((column) => column.heading.padEnd(column.width))
    const rows = names.map((name, row) => {
      const cells = block.map((column) => {
        const { verdict, text } = column.cells[row]!
        return paint(verdict, text) + ' '.repeat(column.width - text.length)
      })
      return [name.padEnd(first), ...cells].join('  ').trimEnd()
    })
    return [...(k > 0 ? [''] : []), ['option'.padEnd(first), ...heading].join('  ').trimEnd(), ...rows]
  })
}
