import { readdirSync, readFileSync } from 'node:fs'
import { join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'

/** Root of the repository. */
export const ROOT = fileURLToPath(new URL('../../', import.meta.url))
const NOT_OURS = new Set(['node_modules', 'dist', 'out', 'coverage', '.git'])

/** Every file below a folder of the repository, as paths from its root. */
export function filesBelow(folder: string): readonly string[] {
  return readdirSync(join(ROOT, folder), { withFileTypes: true }).flatMap((entry) => {
    if (NOT_OURS.has(entry.name)) return []
    const path = join(folder, entry.name)
    return entry.isDirectory() ? filesBelow(path) : [relative(ROOT, join(ROOT, path))]
  })
}

/** Text of a file of the repository. */
export const textAt = (path: string): string => readFileSync(join(ROOT, path), 'utf8')
