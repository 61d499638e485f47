/**
 * Which uncertain inputs a computation reads. A pure function that never reads an input gives the same result
 * whatever its value, so nothing need be computed again at the ends of an input that was not read.
 */
export interface Watch {
  /** Runs a computation and tells what it read; the surrounding computation counts it as read too. */
  readonly during: <T>(compute: () => T) => { readonly value: T; readonly read: ReadonlySet<string> }
  /** Counts inputs as read by the surrounding computation: what it uses was computed from them before. */
  readonly add: (read: ReadonlySet<string>) => void
}

/** Settings whose inputs at some dotted paths tell when they are read. */
export interface Watched<S> {
  readonly settings: S
  readonly watch: Watch
}

/**
 * Watches inputs of settings.
 *
 * @param settings plain nested settings
 * @param paths dotted paths of the inputs
 * @returns the same settings with a telling property at each path, and the watch that listens
 */
export function watched<S extends object>(settings: S, paths: readonly string[]): Watched<S> {
  let current = new Set<string>()
  const tell = (path: string): void => {
    current.add(path)
  }
  const telling = paths.reduce((made, path) => withTelling(made, path.split('.'), () => tell(path)), settings)
  const watch: Watch = {
    during: (compute) => {
      const before = current
      current = new Set()
      const value = compute()
      const read = current
      current = before
      for (const one of read) current.add(one)
      return { value, read }
    },
    add: (read) => {
      for (const one of read) current.add(one)
    },
  }
  return { settings: telling, watch }
}

/** A copy in which the property at the path calls `tell` when it is read; other telling properties stay. */
function withTelling<S extends object>(settings: S, [head, ...rest]: readonly string[], tell: () => void): S {
  const copy = Object.defineProperties({}, Object.getOwnPropertyDescriptors(settings)) as Record<
    string,
    unknown
  >
  const inner = settings[head as keyof S]
  if (rest.length > 0) copy[head!] = withTelling(inner as object, rest, tell)
  else {
    Object.defineProperty(copy, head!, {
      enumerable: true,
      configurable: true,
      get: () => {
        tell()
        return inner
      },
    })
  }
  return copy as S
}
