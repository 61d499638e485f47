import { readdirSync, readFileSync } from 'node:fs'
import type { Node } from '../../src/nodes/node.ts'
import { readNode } from '../../src/nodes/read.ts'
import type { Access } from '../../src/scenario/tree.ts'

const folder = new URL('../../src/nodes/classes/', import.meta.url)
const NO_OTHER_FILES: Access = { read: () => null, builtIn: () => null, builtInIds: () => [] }

/** Ids of the built-in classes, from old to new. */
export const CLASS_IDS = [
  'P180',
  'P130',
  'P90',
  'P65',
  'P40',
  'P28',
  'T22',
  'F16',
  'F10',
  'F7',
  'F5',
  'S3',
] as const

/** Names of the files of the built-in classes. */
export const classFiles = (): readonly string[] => readdirSync(folder)

/** A built-in class, read by the reader of node files. */
export function builtInClass(id: string): Node {
  const read = readNode(readFileSync(new URL(`${id}.yaml`, folder), 'utf8'), `${id}.yaml`, NO_OTHER_FILES)
  if (!read.ok) throw new Error(JSON.stringify(read.faults, null, 2))
  return read.value
}
