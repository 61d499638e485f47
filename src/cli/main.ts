import { machineFiles } from './files.ts'
import { run } from './run.ts'

/** A reader that closes the pipe early, such as `head`, has seen enough: end quietly. */
for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE') throw error
    process.exit()
  })
}

const { stdout, stderr, env } = process
process.exitCode = await run(process.argv.slice(2), {
  stdout,
  stderr,
  files: machineFiles(),
  cwd: process.cwd(),
  env,
})
