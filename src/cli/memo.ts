import { basename, join, resolve } from 'node:path'
import { clean } from '../memo/text/clean.ts'
import { reportFaults } from './fault-lines.ts'
import { DONE, type Io } from './io.ts'
import { judge, load } from './load.ts'
import { memoResources } from './memo-resources.ts'
import type { MemoFormat } from './program.ts'
import type { Tool } from './version.ts'

export interface MemoOptions {
  readonly out: string
  readonly as: readonly MemoFormat[]
  readonly date?: string
  readonly paper: 'a4' | 'letter'
}

/** `tapeworthy memo`: writes the memo in each format, all or none. Returns the exit status. */
export async function memo(file: string, options: MemoOptions, io: Io, tool: Tool): Promise<number> {
  const loaded = await load(file, io)
  if (!loaded.ok) return reportFaults(io, loaded.faults)
  const { makeMemo } = await import('../memo/write.ts')
  const judged = judge(loaded.value, tool, true)
  const date = options.date ?? judged.scenario.date
  const result = { ...judged, scenario: { ...judged.scenario, date } }
  const made = await makeMemo(result, options.as, memoResources(io, options.paper))
  const stem = basename(file).replace(/\.(ya?ml|json)$/i, '')
  const written = made.map(({ ending, content }) => ({
    name: join(options.out, `${stem}.${ending}`),
    content,
  }))
  io.files.writeAll(written.map(({ name, content }) => ({ file: resolve(io.cwd, name), content })))
  for (const { name } of written) io.stdout.write(`${clean(name)}\n`)
  io.stdout.write(`${clean(result.answer.sentence)}\n`)
  return DONE
}
