import { dirname, isAbsolute, join, resolve } from 'node:path'
import type { Access } from '../scenario/tree.ts'
import { FileFault, type Io } from './io.ts'

/** Gives readers access to the files of the machine, without letting a missing file end the run. */
export function accessOf(io: Io): Access {
  const ids = builtInIds(io)
  return {
    read: (path, from) => {
      const file = isAbsolute(path) ? path : join(dirname(from), path)
      try {
        return { file, text: io.files.readText(resolve(io.cwd, file)) }
      } catch (error) {
        if (error instanceof FileFault) return null
        throw error
      }
    },
    builtIn: (id) =>
      ids.includes(id) ? io.files.readText(join(io.files.shipped('classes'), `${id}.yaml`)) : null,
    builtInIds: () => ids,
  }
}

/** Ids of the node classes that ship with the package, sorted by name. */
export function builtInIds(io: Io): readonly string[] {
  return io.files
    .list(io.files.shipped('classes'))
    .filter((name) => name.endsWith('.yaml'))
    .map((name) => name.slice(0, -'.yaml'.length))
}
