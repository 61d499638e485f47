/** What a command writes to. */
export interface Out {
  write(text: string): void
  readonly isTTY?: boolean
  readonly columns?: number
}

/** A file could not be read or written; the message says which and why, for people. */
export class FileFault extends Error {
  override name = 'FileFault'
  constructor(
    readonly file: string,
    readonly why: string,
  ) {
    super(`${file}: ${why}`)
  }
}

/** One file to be written. */
export interface Written {
  readonly file: string
  readonly content: string | Iterable<Uint8Array>
}

/** The only door to files. Paths are absolute or relative to the working directory of the process. */
export interface Files {
  /** Text of a UTF-8 file. Errors: FileFault when missing, not a file, too large or not UTF-8. */
  readText(file: string): string
  /** Bytes of a file. Errors: FileFault. */
  readBytes(file: string): Uint8Array
  exists(file: string): boolean
  /** Names in a folder, sorted. Errors: FileFault. */
  list(folder: string): readonly string[]
  /** Writes all or none: each file appears whole under its name or not at all. Errors: FileFault. */
  writeAll(files: readonly Written[]): void
  /** Absolute path of a file that ships with the package, such as `templates/guide`. */
  shipped(path: string): string
}

/** Everything a command may touch, so that commands run in a test as they run in a shell. */
export interface Io {
  readonly stdout: Out
  readonly stderr: Out
  readonly files: Files
  readonly cwd: string
  readonly env: Readonly<Record<string, string | undefined>>
}

/** Exit statuses: part of the contract with scripts. */
export const DONE = 0
export const PROGRAM_FAULT = 1
export const INPUT_WRONG = 2
export const MUST_PASS_MISSED = 3
