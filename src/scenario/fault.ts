/** One fault of an input, with everything needed to mend it. Faults are collected, never thrown. */
export interface Fault {
  /** Documented code, see the table of the guide. */
  readonly code: string
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
