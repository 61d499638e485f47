import { symbol, symbolCircle, symbolDiamond, symbolSquare, symbolTimes } from 'd3-shape'
import type { Verdict } from '../../verdict/result.ts'
import { PAINT } from '../text/verdict.ts'
import type { PathMark } from './figure.ts'

const SHAPES = { pass: symbolCircle, tight: symbolDiamond, fail: symbolTimes, unknown: symbolSquare } as const

/** The dot of a verdict: circle, diamond, cross or open square, so that hue is never the only difference. */
export function verdictDot(verdict: Verdict, x: number, y: number, area: number, of: string): PathMark {
  const d = symbol(SHAPES[verdict], area)() ?? ''
  const { mark } = PAINT[verdict]
  if (verdict === 'fail') return { kind: 'path', x, y, d, stroke: mark, width: 1.4, of }
  if (verdict === 'unknown') return { kind: 'path', x, y, d, fill: '#ffffff', stroke: mark, width: 1, of }
  return { kind: 'path', x, y, d, fill: mark, stroke: '#ffffff', width: 0.5, of }
}
