import { clean } from '../memo/text/clean.ts'
import type { Fault } from '../scenario/fault.ts'
import type { ArgumentCode } from './argument-codes.ts'
import { type FileFault, INPUT_WRONG, type Io } from './io.ts'

/** One fault on four lines: `file:line:column  code`, then what was found, what is allowed, the remedy. */
export function faultLines(
  fault: Omit<Fault, 'code'> & { readonly code: Fault['code'] | ArgumentCode },
): string {
  const place = fault.line > 0 ? `${fault.file}:${fault.line}:${fault.column}` : fault.file
  return [
    `${clean(place)}  ${fault.code}`,
    `    found    ${clean(fault.found)}`,
    `    allowed  ${clean(fault.allowed)}`,
    `    remedy   ${clean(fault.remedy)}`,
  ].join('\n')
}

/** Prints every fault on the error stream and yields the exit status for wrong input. */
export function reportFaults(io: Io, faults: readonly Fault[]): number {
  for (const fault of faults) io.stderr.write(`${faultLines(fault)}\n`)
  const many = faults.length === 1 ? '1 fault' : `${faults.length} faults`
  io.stderr.write(`\n${many}; nothing was computed. What the codes mean: tapeworthy guide\n`)
  return INPUT_WRONG
}

/** One wrong argument or file, in the form of every other fault. */
export function refuse(
  io: Io,
  code: ArgumentCode,
  file: string,
  found: string,
  allowed: string,
  remedy: string,
) {
  io.stderr.write(`${faultLines({ code, file, line: 0, column: 0, found, allowed, remedy })}\n`)
  return INPUT_WRONG
}

/** Prints why a file could not be read or written. */
export function reportFile(io: Io, fault: FileFault): number {
  return refuse(
    io,
    'argument.file',
    fault.file,
    fault.why,
    'a file that can be used',
    'check the path and its permissions',
  )
}
