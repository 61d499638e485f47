/** Numbers found from other numbers, kept by those that they were found from. Whoever evaluates a case owns one. */
export interface Kept {
  /** What `find` found for these numbers before, else what it finds now. */
  readonly of: <T>(what: string, from: readonly number[], find: () => T) => T
}

/** Entries beyond this are forgotten all at once: draws must not fill the memory. */
const MOST = 512

/** An empty store. It never changes a result: the same numbers always find the same. */
export function keeping(): Kept {
  const found = new Map<string, unknown>()
  return {
    of: <T>(what: string, from: readonly number[], find: () => T): T => {
      const key = `${what} ${from.join(' ')}`
      if (!found.has(key)) {
        if (found.size >= MOST) found.clear()
        found.set(key, find())
      }
      return found.get(key) as T
    },
  }
}
