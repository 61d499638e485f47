import { CommanderError } from 'commander'
import { clean } from '../memo/text/clean.ts'
import { reportFile } from './fault-lines.ts'
import { DONE, FileFault, INPUT_WRONG, type Io, PROGRAM_FAULT } from './io.ts'
import { nearest } from './nearest.ts'
import { commandNames, programFor } from './program.ts'
import { toolOf } from './version.ts'

const WELCOME = `tapeworthy: can this clocking or SerDes block be built in that process, and what limits it?
  tapeworthy start link lane.yaml    writes a commented scenario that runs as it is
  tapeworthy check lane.yaml         shows the verdict of every option in every node
  tapeworthy memo lane.yaml          writes the memo as HTML, PDF, JSON and CSV
  tapeworthy --help                  lists every command; tapeworthy guide writes the user's guide
`

function unknownCommand(io: Io, name: string): number {
  const near = nearest(name, commandNames)
  io.stderr.write(`tapeworthy: there is no command '${clean(name)}'; the nearest is '${near}'\n`)
  io.stderr.write('    see tapeworthy --help\n')
  return INPUT_WRONG
}

function programFault(io: Io, error: unknown): number {
  const message = error instanceof Error ? error.message : String(error)
  io.stderr.write(`tapeworthy: a fault of the program: ${clean(message)}\n`)
  if (io.env.TAPEWORTHY_DEBUG === '1' && error instanceof Error) io.stderr.write(`${error.stack}\n`)
  else io.stderr.write('    TAPEWORTHY_DEBUG=1 shows where it happened\n')
  return PROGRAM_FAULT
}

/**
 * The whole command line, for a shell or a test.
 *
 * @param argv arguments after the program's name
 * @param io streams, files, folder and environment
 * @returns exit status: 0 done, 1 a fault of the program, 2 wrong input, 3 a node that must pass does not
 */
export async function run(argv: readonly string[], io: Io): Promise<number> {
  const [first] = argv
  if (first === undefined) {
    io.stdout.write(WELCOME)
    return DONE
  }
  if (!first.startsWith('-') && first !== 'help' && !commandNames.includes(first)) {
    return unknownCommand(io, first)
  }
  let status = DONE
  const program = programFor(io, toolOf(io.files), (left) => {
    status = left
  })
  try {
    await program.parseAsync([...argv], { from: 'user' })
    return status
  } catch (error) {
    if (error instanceof CommanderError) return error.exitCode === 0 ? DONE : INPUT_WRONG
    if (error instanceof FileFault) return reportFile(io, error)
    return programFault(io, error)
  }
}
