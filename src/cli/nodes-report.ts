import { clean } from '../memo/text/clean.ts'
import type { Node } from '../nodes/node.ts'
import type { Provenance } from '../scenario/checked.ts'
import { shownValue } from './shown.ts'
import { wrapped } from './wrapped.ts'

/** One line a class: id, class, kind, supplies, name. */
export function nodesReport(nodes: readonly Node[]): string {
  const rows = nodes.map(({ id, label, values }) => [
    clean(id),
    `${Math.round(values.class * 1e10) / 10} nm`,
    values.kind,
    shownValue(values.supply.core, 'V'),
    values.supply.analogue === null ? '–' : shownValue(values.supply.analogue, 'V'),
    clean(label),
  ])
  const head = ['id', 'class', 'kind', 'core', 'analogue', 'name']
  const table = [head, ...rows]
  const widths = head.map((_, k) => Math.max(...table.map((row) => row[k]!.length)))
  const lines = table.map((row) =>
    row
      .map((cell, k) => cell.padEnd(widths[k]!))
      .join('  ')
      .trimEnd(),
  )
  return [...lines, '', 'tapeworthy nodes ID shows every value of a class and its source.'].join('\n')
}

function stated({ value, unit, shown, spread }: Provenance): string {
  if (value === null) return 'not stated'
  if (typeof value !== 'number') return clean(Array.isArray(value) ? value.join(', ') : String(value))
  const ends =
    spread === undefined
      ? ''
      : ` (${shownValue(spread.low, unit, shown)} to ${shownValue(spread.high, unit, shown)})`
  return `${shownValue(value, unit, shown)}${ends}`
}

/** Every value of a node with evidence and source. */
export function nodeReport({ id, label, provenance }: Node, width: number): string {
  const values = provenance.filter(({ value }) => value !== null)
  return [
    `${clean(id)}  ${clean(label)}`,
    ...values.flatMap((one) => [
      wrapped(`${one.path} = ${stated(one)}`, width, '  ', '      '),
      wrapped(clean(`${one.evidence}; ${one.source}`), width, '      '),
    ]),
  ].join('\n')
}
