import type { Node } from '../nodes/node.ts'
import { resolveNodes } from '../nodes/read.ts'
import { accessOf, builtInIds } from './access.ts'
import { refuse, reportFaults } from './fault-lines.ts'
import { DONE, type Io } from './io.ts'
import { nearest } from './nearest.ts'
import { nodeReport, nodesReport } from './nodes-report.ts'
import { widthOf } from './paint.ts'

/** The built-in classes, largest first. Errors: throws when one has a fault, a fault of the package. */
export function builtInNodes(io: Io, ids: readonly string[] = builtInIds(io)): readonly Node[] {
  const found = resolveNodes(ids, 'built-in', accessOf(io))
  if (!found.ok) throw new Error(`a built-in node class has a fault: ${found.faults[0]?.code ?? ''}`)
  return [...found.value.nodes].sort((a, b) => b.values.class - a.values.class || (a.id < b.id ? -1 : 1))
}

/** `tapeworthy nodes`: lists the built-in classes, or one with every value. Returns the exit status. */
export async function nodes(id: string | undefined, io: Io): Promise<number> {
  const ids = builtInIds(io)
  if (id === undefined) {
    io.stdout.write(`${nodesReport(builtInNodes(io))}\n`)
    return DONE
  }
  if (!ids.includes(id)) {
    return refuse(io, 'argument.choice', 'nodes', id, ids.join(', '), `nearest: ${nearest(id, ids)}`)
  }
  const found = resolveNodes([id], 'built-in', accessOf(io))
  if (!found.ok) return reportFaults(io, found.faults)
  io.stdout.write(`${found.value.nodes.map((one) => nodeReport(one, widthOf(io))).join('\n\n')}\n`)
  return DONE
}
