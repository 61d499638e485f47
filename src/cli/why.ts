import { refuse, reportFaults } from './fault-lines.ts'
import { DONE, type Io } from './io.ts'
import { judge, load } from './load.ts'
import { nearest } from './nearest.ts'
import { painter, widthOf } from './paint.ts'
import type { Tool } from './version.ts'
import { whyReport } from './why-report.ts'

export interface Asked {
  readonly file: string
  readonly option: string
  readonly node: string
  readonly check?: string | undefined
}

/** `tapeworthy why`: prints the derivation of a case or of one check. Returns the exit status. */
export async function why(asked: Asked, io: Io, tool: Tool): Promise<number> {
  const loaded = await load(asked.file, io)
  if (!loaded.ok) return reportFaults(io, loaded.faults)
  const { scenario, nodes } = loaded.value
  const unknown = (what: 'option' | 'node' | 'check', word: string, known: readonly string[]): number =>
    refuse(
      io,
      `argument.${what}`,
      what.toUpperCase(),
      word,
      known.join(', '),
      `nearest: ${nearest(word, known)}`,
    )
  const options = scenario.options.filter(({ id }) => id === asked.option)
  if (options.length === 0)
    return unknown(
      'option',
      asked.option,
      scenario.options.map(({ id }) => id),
    )
  const here = nodes.filter(({ id }) => id === asked.node)
  if (here.length === 0)
    return unknown(
      'node',
      asked.node,
      nodes.map(({ id }) => id),
    )
  const result = judge({ ...loaded.value, scenario: { ...scenario, options }, nodes: here }, tool, true)
  const one = result.cases[0]!
  const checks = one.checks.filter(({ id }) => asked.check === undefined || id === asked.check)
  if (checks.length === 0)
    return unknown(
      'check',
      asked.check ?? '',
      one.checks.map(({ id }) => id),
    )
  io.stdout.write(`${whyReport(one, checks, result.guard, widthOf(io), painter(io))}\n`)
  return DONE
}
