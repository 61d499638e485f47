/**
 * Installs the dependencies when they are missing or older than the lock file; silent when all is ready.
 * What was installed is remembered by the hash of the lock file, in node_modules/.tapeworthy-lock.
 */
import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('..', import.meta.url))
const lockFile = `${root}package-lock.json`
const modules = `${root}node_modules`
const marker = `${modules}/.tapeworthy-lock`

const lock = readFileSync(lockFile)
const hash = createHash('sha256').update(lock).digest('hex')

/** True when npm itself has already installed exactly what the lock file names. */
function installedAsLocked() {
  const installed = `${modules}/.package-lock.json`
  if (!existsSync(installed)) return false
  const wanted = JSON.parse(lock.toString('utf8')).packages
  const present = JSON.parse(readFileSync(installed, 'utf8')).packages
  return Object.entries(wanted).every(
    ([place, entry]) => place === '' || entry.optional || present[place]?.version === entry.version,
  )
}

function ready() {
  if (!existsSync(modules)) return false
  if (existsSync(marker)) return readFileSync(marker, 'utf8').trim() === hash
  return installedAsLocked()
}

if (!ready()) {
  const why = existsSync(modules)
    ? 'dependencies are older than package-lock.json'
    : 'dependencies are missing'
  console.log(`${why}: installing them with npm ci`)
  const npm = process.platform === 'win32' ? 'npm.cmd' : 'npm'
  const flags = ['ci', '--ignore-scripts', '--no-audit', '--no-fund', '--loglevel=error']
  const done = spawnSync(npm, flags, { cwd: root, stdio: 'inherit', shell: process.platform === 'win32' })
  if (done.status !== 0) {
    console.error('npm ci failed; nothing else was tried')
    process.exit(1)
  }
}
if (!existsSync(marker)) writeFileSync(marker, `${hash}\n`)
else if (readFileSync(marker, 'utf8').trim() !== hash) writeFileSync(marker, `${hash}\n`)
