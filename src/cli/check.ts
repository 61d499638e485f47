import type { Result } from '../verdict/result.ts'
import { checkReport } from './check-report.ts'
import { refuse, reportFaults } from './fault-lines.ts'
import { DONE, type Io, MUST_PASS_MISSED } from './io.ts'
import { judge, load } from './load.ts'
import { nearest } from './nearest.ts'
import { painter, widthOf } from './paint.ts'
import type { Tool } from './version.ts'

export interface CheckOptions {
  readonly json?: boolean
  readonly mustPass?: readonly string[]
}

/** `tapeworthy check`: prints the verdicts, or the whole result as JSON. Returns the exit status. */
export async function check(file: string, options: CheckOptions, io: Io, tool: Tool): Promise<number> {
  const loaded = await load(file, io)
  if (!loaded.ok) return reportFaults(io, loaded.faults)
  const result = judge(loaded.value, tool, options.json === true)
  const named = (options.mustPass ?? []).flatMap((word) => word.split(',')).filter((word) => word !== '')
  const ids = result.nodes.map(({ id }) => id)
  const stranger = named.find((id) => !ids.includes(id))
  if (stranger !== undefined) {
    const near = ids.length === 0 ? '' : ` (nearest: ${nearest(stranger, ids)})`
    return refuse(
      io,
      'argument.node',
      '--must-pass',
      stranger,
      ids.join(', '),
      `name a node of ${file}${near}`,
    )
  }
  if (options.json === true) io.stdout.write(`${JSON.stringify(result, null, 2)}\n`)
  else io.stdout.write(`${checkReport(result, widthOf(io), painter(io))}\n`)
  return missed(result, named, io)
}

/** A node passes when at least one option passes in it: tight, unknown and fail do not. */
function missed(result: Result, named: readonly string[], io: Io): number {
  const failing = named.filter(
    (id) => !result.cases.some(({ node, verdict }) => node === id && verdict === 'pass'),
  )
  for (const id of failing) io.stderr.write(`must pass, but no option passes in it: ${id}\n`)
  return failing.length === 0 ? DONE : MUST_PASS_MISSED
}
