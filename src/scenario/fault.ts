import type { FaultCode } from './fault-codes.ts'

/** One fault of an input, with everything needed to mend it. Faults are collected, never thrown. */
export interface Fault {
  /** Documented code, see the table of the guide. */
  readonly code: FaultCode
  readonly file: string
  /** 1-based; 0 when the fault has no place in the text. */
  readonly line: number
  readonly column: number
  readonly found: string
  readonly allowed: string
  readonly remedy: string
}

/** `file:line:column code: found; allowed; remedy` on one line. */
export function faultLine(fault: Fault): string {
  const place = fault.line > 0 ? `${fault.file}:${fault.line}:${fault.column}` : fault.file
  return `${place}  ${fault.code}: found ${fault.found}; allowed: ${fault.allowed}; to mend: ${fault.remedy}`
}

/** A place in a file; line and column count from 1, and are 0 where there is none. */
export interface Place {
  readonly file: string
  readonly line: number
  readonly column: number
}

/** A fault at a place. */
export function faultAt(
  place: Place,
  code: FaultCode,
  found: string,
  allowed: string,
  remedy: string,
): Fault {
  return { code, ...place, found: shortened(found), allowed, remedy }
}

/**
 * Faults in the order of the text, file after file as each first appears. What several options or nodes share is
 * found once for each of them, and told once.
 */
export function inOrder(faults: readonly Fault[]): readonly Fault[] {
  const seen = new Set<string>()
  const unique = faults.filter(({ code, file, line, column, found }) => {
    const key = [code, file, line, column, found].join('\u0000')
    return seen.has(key) ? false : seen.add(key)
  })
  const files = [...new Set(unique.map(({ file }) => file))]
  const rank = new Map(files.map((file, k) => [file, k]))
  return unique.sort(
    (a, b) => rank.get(a.file)! - rank.get(b.file)! || a.line - b.line || a.column - b.column,
  )
}

/** Long findings are cut so that a message stays a message. */
function shortened(text: string): string {
  const plain = text.replace(/\s+/g, ' ').trim() || 'nothing'
  return plain.length > 80 ? `${plain.slice(0, 77)}…` : plain
}
