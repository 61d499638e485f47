import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { machineFiles } from '../../src/cli/files.ts'
import type { Io } from '../../src/cli/io.ts'
import { run } from '../../src/cli/run.ts'

/** What a command left behind. */
export interface Left {
  readonly status: number
  readonly out: string
  readonly err: string
}

/** A folder of its own, in which commands run as in a shell without a terminal. */
export interface Shell {
  readonly folder: string
  readonly run: (...argv: readonly string[]) => Promise<Left>
  readonly io: (out: (text: string) => void, err: (text: string) => void) => Io
  readonly remove: () => void
}

/** Opens a shell in a fresh temporary folder; `terminal` pretends that the output is a terminal that wide. */
export function openShell(
  env: Readonly<Record<string, string>> = {},
  terminal?: { readonly columns: number },
): Shell {
  const folder = mkdtempSync(join(tmpdir(), 'tapeworthy-test-'))
  const io: Shell['io'] = (out, err) => ({
    stdout: { write: out, ...(terminal === undefined ? {} : { isTTY: true, columns: terminal.columns }) },
    stderr: { write: err },
    files: machineFiles(),
    cwd: folder,
    env,
  })
  return {
    folder,
    io,
    run: async (...argv) => {
      const [out, err]: [string[], string[]] = [[], []]
      const status = await run(
        argv,
        io(
          (text) => out.push(text),
          (text) => err.push(text),
        ),
      )
      return { status, out: out.join(''), err: err.join('') }
    },
    remove: () => rmSync(folder, { recursive: true, force: true }),
  }
}
