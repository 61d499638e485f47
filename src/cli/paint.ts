import type { Verdict } from '../verdict/result.ts'
import type { Io } from './io.ts'

const COLOURS: Readonly<Record<Verdict, number>> = { pass: 32, tight: 33, fail: 31, unknown: 35 }

/** Colours a text by verdict. The word always stands in the text: colour only repeats it. */
export type Paint = (verdict: Verdict, text: string) => string

/** Colour on a terminal that can show it, unless NO_COLOR asks for none. */
export function painter(io: Io): Paint {
  const asked = io.env.NO_COLOR === undefined || io.env.NO_COLOR === ''
  if (io.stdout.isTTY !== true || !asked || io.env.TERM === 'dumb') return (_, text) => text
  return (verdict, text) => `\u001b[${COLOURS[verdict]}m${text}\u001b[39m`
}

/** Columns to write into: the terminal's, 80 when unknown, never below 40. */
export function widthOf(io: Io): number {
  return Math.max(40, io.stdout.columns ?? 80)
}
