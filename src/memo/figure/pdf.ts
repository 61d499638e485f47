import type { Figure, Mark } from './figure.ts'

/** The few drawing orders of a PDF document that figures need, so that this file loads nothing. */
export interface Pen {
  save(): this
  restore(): this
  translate(x: number, y: number): this
  scale(factor: number): this
  rect(x: number, y: number, width: number, height: number): this
  moveTo(x: number, y: number): this
  lineTo(x: number, y: number): this
  path(d: string): this
  lineWidth(width: number): this
  dash(length: number, options: { space: number }): this
  undash(): this
  fill(colour: string): this
  stroke(colour: string): this
  fillAndStroke(fill: string, stroke: string): this
  fillColor(colour: string): this
  font(name: string): this
  fontSize(size: number): this
  widthOfString(text: string): number
  // biome-ignore lint/suspicious/noExplicitAny: the library's own options
  text(text: string, x: number, y: number, options: any): this
}

/**
 * Draws a figure with its upper left corner at (x, y), in points.
 *
 * @param pen document with the fonts `sans` and `bold`
 * @param factor enlargement
 */
export function toPdf(pen: Pen, figure: Figure, x: number, y: number, factor = 1): void {
  pen.save().translate(x, y).scale(factor)
  for (const mark of figure.marks) draw(pen, mark)
  pen.restore()
}

function draw(pen: Pen, mark: Mark): void {
  if (mark.kind === 'text') {
    write(pen, mark)
    return
  }
  pen.save()
  if (mark.kind === 'rect') {
    outline(pen, 0.75, mark.dash)
    pen.rect(mark.x, mark.y, mark.width, mark.height)
    paint(pen, mark.fill, mark.stroke)
  } else if (mark.kind === 'line') {
    outline(pen, mark.width, mark.dash)
    pen.moveTo(mark.x1, mark.y1).lineTo(mark.x2, mark.y2).stroke(mark.stroke)
  } else {
    outline(pen, mark.width ?? 1, mark.dash)
    pen.translate(mark.x, mark.y).path(mark.d)
    paint(pen, mark.fill, mark.stroke)
  }
  pen.restore()
}

function outline(pen: Pen, width: number, dash?: readonly number[]): void {
  pen.lineWidth(width)
  if (dash !== undefined) pen.dash(dash[0] ?? 1, { space: dash[1] ?? dash[0] ?? 1 })
}

function paint(pen: Pen, fill: string | undefined, stroke: string | undefined): void {
  if (fill !== undefined && stroke !== undefined) pen.fillAndStroke(fill, stroke)
  else if (fill !== undefined) pen.fill(fill)
  else if (stroke !== undefined) pen.stroke(stroke)
}

function write(pen: Pen, { x, y, text, size, fill, anchor, bold }: Extract<Mark, { kind: 'text' }>): void {
  pen
    .font(bold === true ? 'bold' : 'sans')
    .fontSize(size)
    .fillColor(fill)
  const width = anchor === 'start' ? 0 : pen.widthOfString(text)
  const left = anchor === 'start' ? x : anchor === 'end' ? x - width : x - width / 2
  pen.text(text, left, y, { lineBreak: false, baseline: 'alphabetic' })
}
