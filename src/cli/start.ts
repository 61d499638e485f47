import { resolve } from 'node:path'
import { clean } from '../memo/text/clean.ts'
import { starters } from '../scenario/starters.ts'
import { refuse } from './fault-lines.ts'
import { DONE, type Io } from './io.ts'
import { nearest } from './nearest.ts'

/** `tapeworthy start`: writes a starter scenario; never over an existing file. Returns the exit status. */
export async function start(block: string, file: string, io: Io): Promise<number> {
  const known = Object.keys(starters)
  const text = known.includes(block) ? starters[block as keyof typeof starters] : null
  if (text === null) {
    return refuse(
      io,
      'argument.choice',
      'start',
      block,
      known.join(', '),
      `nearest: ${nearest(block, known)}`,
    )
  }
  const target = resolve(io.cwd, file)
  if (io.files.exists(target)) {
    return refuse(
      io,
      'argument.exists',
      file,
      'a file of that name',
      'a new file',
      'name another file, or remove it first',
    )
  }
  io.files.writeAll([{ file: target, content: text }])
  io.stdout.write(`${clean(file)}\n    next: tapeworthy check ${clean(file)}\n`)
  return DONE
}
