import type { Verdict } from '../../verdict/result.ts'
import { INK, SOFT } from '../figure/figure.ts'
import { PAINT } from '../text/verdict.ts'
import { piece, type Style } from './lines.ts'
import type { Cell } from './table.ts'

export const plainText = (size: number): Style => ({ font: 'sans', size, colour: INK })
export const strong = (size: number): Style => ({ font: 'bold', size, colour: INK })
export const quiet = (size: number): Style => ({ font: 'sans', size, colour: SOFT })
export const code = (size: number): Style => ({ font: 'mono', size, colour: INK })

/** Sign and word of a verdict; all but a pass stand out in bold. */
export function verdictCell(verdict: Verdict, size: number): Cell {
  const style = verdict === 'pass' ? plainText(size) : strong(size)
  return { text: [piece(`${PAINT[verdict].sign} ${verdict}`, style)] }
}

/** A text cell with quieter paragraphs below; empty ones are left out. */
export function stackedCell(text: string, below: readonly string[], size: number): Cell {
  const more = below.filter((one) => one !== '').map((one) => [piece(one, quiet(size - 0.5))])
  return { text: [piece(text, plainText(size))], below: more }
}
