/** A figure as data: a short list of primitives, drawn alike to SVG and to PDF. Lengths in points, y down. */
export interface Figure {
  readonly id: string
  readonly title: string
  /** What the figure shows, in words, for those who do not see it. */
  readonly description: string
  readonly width: number
  readonly height: number
  readonly marks: readonly Mark[]
}

export interface RectMark {
  readonly kind: 'rect'
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
  readonly fill: string
  readonly stroke?: string
  readonly dash?: readonly number[]
  /** Names the datum, so that a reader of the primitives finds it again. */
  readonly of?: string
}

export interface LineMark {
  readonly kind: 'line'
  readonly x1: number
  readonly y1: number
  readonly x2: number
  readonly y2: number
  readonly stroke: string
  readonly width: number
  readonly dash?: readonly number[]
  readonly of?: string
}

export interface TextMark {
  readonly kind: 'text'
  readonly x: number
  /** Base line. */
  readonly y: number
  readonly text: string
  readonly size: number
  readonly fill: string
  readonly anchor: 'start' | 'middle' | 'end'
  readonly bold?: boolean
}

/** An SVG path, moved to (x, y): plot symbols and curves. */
export interface PathMark {
  readonly kind: 'path'
  readonly x: number
  readonly y: number
  readonly d: string
  readonly fill?: string
  readonly stroke?: string
  readonly width?: number
  readonly dash?: readonly number[]
  readonly of?: string
}

export type Mark = RectMark | LineMark | TextMark | PathMark

export const INK = '#1d2127'
export const FAINT = '#c9ced6'
export const SOFT = '#565c66'
