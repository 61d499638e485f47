import { nodeKeys } from '../nodes/keys.ts'
import { jsonSchema } from '../scenario/json-schema.ts'
import { refuse } from './fault-lines.ts'
import { DONE, type Io } from './io.ts'
import { nearest } from './nearest.ts'

const KINDS = ['scenario', 'node'] as const

/** `tapeworthy schema`: prints the JSON Schema of scenario or node files. Returns the exit status. */
export async function schema(which: string, io: Io): Promise<number> {
  const kind = KINDS.find((one) => one === which)
  if (kind === undefined) {
    return refuse(
      io,
      'argument.choice',
      'schema',
      which,
      KINDS.join(', '),
      `nearest: ${nearest(which, KINDS)}`,
    )
  }
  io.stdout.write(`${JSON.stringify(jsonSchema(kind, nodeKeys), null, 2)}\n`)
  return DONE
}
