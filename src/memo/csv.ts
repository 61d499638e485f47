import type { Result } from '../verdict/result.ts'
import { clean } from './text/clean.ts'

type Cell = string | number | boolean | null

/** One line per check of every case, values in SI. */
export function checksCsv(result: Result): string {
  const head =
    'option,node,case_verdict,case_margin,check,sub_block,title,quantity,sense,required,available,unit,margin,typical_margin,verdict,advisory,limits_case,corner,temperature_K,supply_V,basis,reason'
  const rows = result.cases.flatMap((given) =>
    given.checks.map((check): readonly Cell[] => [
      given.option,
      given.node,
      given.verdict,
      given.margin,
      check.id,
      check.subBlock,
      check.title,
      check.quantity,
      check.sense,
      check.required,
      check.available,
      check.unit,
      check.margin,
      check.typicalMargin,
      check.verdict,
      check.advisory === true,
      check.id === given.limitedBy,
      check.operatingPoint?.corner ?? null,
      check.operatingPoint?.temperature_K ?? null,
      check.operatingPoint?.supply_V ?? null,
      check.basis,
      check.reason ?? null,
    ]),
  )
  return table(head, rows)
}

/** One line per value that was used, in SI. */
export function assumptionsCsv(result: Result): string {
  const rows = result.assumptions.map((given): readonly Cell[] => [
    given.path,
    typeof given.value === 'object' && given.value !== null ? given.value.join('; ') : given.value,
    given.low ?? null,
    given.high ?? null,
    given.unit,
    given.origin,
    given.evidence,
    given.source,
  ])
  return table('path,value,low,high,unit,origin,evidence,source', rows)
}

/** RFC 4180: lines end in CR LF, cells are quoted where they must be. */
function table(head: string, rows: readonly (readonly Cell[])[]): string {
  return [head, ...rows.map((row) => row.map(cellText).join(','))].map((line) => `${line}\r\n`).join('')
}

/** Numbers plain, unknown values empty; text that a spreadsheet would run as a formula gets an apostrophe. */
export function cellText(cell: Cell): string {
  if (cell === null) return ''
  if (typeof cell === 'number') return Number.isFinite(cell) ? String(cell) : ''
  if (typeof cell === 'boolean') return cell ? 'yes' : 'no'
  const text = /^[\t\r]/.test(cell) ? `'${clean(cell)}` : clean(cell)
  const guarded = /^[=+\-@\uff1d\uff0b\uff0d\uff20]/.test(text) ? `'${text}` : text
  return /[",\r\n]/.test(guarded) ? `"${guarded.replace(/"/g, '""')}"` : guarded
}
