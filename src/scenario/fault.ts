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

/** Long findings are cut so that a message stays a message. */
function shortened(text: string): string {
  const plain = text.replace(/\s+/g, ' ').trim() || 'nothing'
  return plain.length > 80 ? `${plain.slice(0, 77)}…` : plain
}
