import type { Files } from './io.ts'

/** Name and version of the tool, from its package.json. */
export interface Tool {
  readonly name: string
  readonly version: string
}

/** Reads the tool's own name and version. */
export function toolOf(files: Files): Tool {
  const { name, version } = JSON.parse(files.readText(files.shipped('package.json'))) as Tool
  return { name, version }
}
