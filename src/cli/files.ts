import {
  closeSync,
  existsSync,
  fsyncSync,
  mkdirSync,
  openSync,
  readdirSync,
  readFileSync,
  realpathSync,
  renameSync,
  rmSync,
  statSync,
  writeSync,
} from 'node:fs'
import { basename, dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { FileFault, type Files, type Written } from './io.ts'

/** No scenario, node file or template comes near this; what does is not one of ours. */
const LARGEST_BYTES = 16 * 2 ** 20

const WHY: Readonly<Record<string, string>> = {
  ENOENT: 'no such file or folder',
  EACCES: 'permission denied',
  EPERM: 'permission denied',
  EISDIR: 'is a folder, not a file',
  EEXIST: 'part of the path is a file, not a folder',
  ENOTDIR: 'part of the path is a file, not a folder',
  ENOSPC: 'no space left',
  EROFS: 'the file system is read-only',
  ENAMETOOLONG: 'the name is too long',
  ELOOP: 'the links go in a circle',
}

function faultOf(file: string, error: unknown): FileFault {
  if (error instanceof FileFault) return error
  const { code } = error as { code?: string }
  return new FileFault(file, WHY[code ?? ''] ?? code ?? 'cannot be used')
}

function readBytes(file: string): Uint8Array {
  try {
    const about = statSync(file)
    if (about.isDirectory()) throw new FileFault(file, WHY.EISDIR!)
    if (!about.isFile() && !about.isFIFO()) throw new FileFault(file, 'is not a plain file')
    if (about.size > LARGEST_BYTES) throw new FileFault(file, 'is larger than 16 MiB')
    return readFileSync(file)
  } catch (error) {
    throw faultOf(file, error)
  }
}

function readText(file: string): string {
  const bytes = readBytes(file)
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    throw new FileFault(file, 'is not text in UTF-8')
  }
}

function list(folder: string): readonly string[] {
  try {
    return readdirSync(folder).sort()
  } catch (error) {
    throw faultOf(folder, error)
  }
}

/** Writes a temporary file beside the target and returns both names. */
function stage({ file, content }: Written): { readonly part: string; readonly file: string } {
  mkdirSync(dirname(file), { recursive: true })
  const target = existsSync(file) ? realpathSync(file) : file
  if (existsSync(target) && statSync(target).isDirectory()) throw new FileFault(file, WHY.EISDIR!)
  const part = join(dirname(target), `.${basename(target)}.${process.pid}.part`)
  try {
    const handle = openSync(part, 'w')
    try {
      const parts = typeof content === 'string' ? [new TextEncoder().encode(content)] : content
      for (const bytes of parts) {
        for (let done = 0; done < bytes.length; ) done += writeSync(handle, bytes, done)
      }
      fsyncSync(handle)
    } finally {
      closeSync(handle)
    }
  } catch (error) {
    rmSync(part, { force: true })
    throw error
  }
  return { part, file: target }
}

function writeAll(files: readonly Written[]): void {
  const staged: { readonly part: string; readonly file: string }[] = []
  let at = ''
  try {
    for (const one of files) {
      at = one.file
      staged.push(stage(one))
    }
    for (const { part, file } of staged) {
      at = file
      renameSync(part, file)
    }
  } catch (error) {
    for (const { part } of staged) rmSync(part, { force: true })
    throw faultOf(at, error)
  }
}

/** Folder of the package: the nearest one above this module that holds a package.json. */
function packageFolder(): string {
  let folder = dirname(fileURLToPath(import.meta.url))
  while (!existsSync(join(folder, 'package.json'))) {
    const above = dirname(folder)
    if (above === folder) throw new Error('the package is not complete: package.json is missing')
    folder = above
  }
  return folder
}

/** Files of the machine. Built-in node classes stand in src/ in a clone and in dist/ once built. */
export function machineFiles(): Files {
  const folder = packageFolder()
  const built = !existsSync(join(folder, 'src'))
  return {
    readText,
    readBytes,
    exists: existsSync,
    list,
    writeAll,
    shipped: (path) =>
      join(folder, path === 'classes' ? (built ? 'dist/classes' : 'src/nodes/classes') : path),
  }
}
