import type {} from 'pdfkit'
import { joinedBytes } from '../bytes.ts'
import { FAINT, INK, SOFT } from '../figure/figure.ts'
import type { Pen } from '../figure/pdf.ts'
import { type FontName, type Line, linesOf, type Measure, type Piece, piece, type Style } from './lines.ts'

type Doc = PDFKit.PDFDocument
export type Element = PDFKit.PDFStructureElement

/** Paper sizes in points. */
export const PAPER = { a4: [595.28, 841.89], letter: [612, 792] } as const
export type Paper = keyof typeof PAPER

const MARGIN = { side: 46, top: 58, bottom: 52 }

/** A tagged document with a cursor: knows where it is on the page and begins a new one when it must. */
export class Sheet {
  readonly doc: Doc
  readonly left = MARGIN.side
  readonly right: number
  readonly bottom: number
  readonly measure: Measure
  y = MARGIN.top
  #parent: Element
  readonly #outlines: PDFKit.PDFOutline[]

  constructor(doc: Doc) {
    this.doc = doc
    this.measure = measureWith(doc)
    doc.addPage()
    this.right = doc.page.width - MARGIN.side
    this.bottom = doc.page.height - MARGIN.bottom
    this.#parent = doc.struct('Document')
    doc.addStructure(this.#parent)
    this.#outlines = [doc.outline]
  }

  get width(): number {
    return this.right - this.left
  }

  get room(): number {
    return this.bottom - this.y
  }

  /** Height of an empty page between its margins. */
  get pageRoom(): number {
    return this.bottom - MARGIN.top
  }

  get pen(): Pen {
    return this.doc as unknown as Pen
  }

  newPage(): void {
    condense(this.doc.page)
    this.doc.addPage()
    this.y = MARGIN.top
  }

  /** Begins a new page unless `height` points are left on this one. */
  ensure(height: number): void {
    if (this.room < height && this.y > MARGIN.top) this.newPage()
  }

  /** A new element under the current one. */
  element(type: string, options: object = {}, parent: Element = this.#parent): Element {
    const made = this.doc.struct(type, options)
    parent.add(made)
    return made
  }

  /** Runs `body` with everything it writes inside one element. */
  inside(type: string, body: () => void): void {
    const before = this.#parent
    this.#parent = this.element(type)
    body()
    this.#parent = before
  }

  /** Draws what is decoration only and not read out. */
  artifact(draw: () => void): void {
    this.doc.markContent('Artifact', { type: 'Layout' })
    draw()
    this.doc.endMarkedContent()
  }

  /** Heading with its bookmark. Level 1 is the title. `keep` is the room in points that must follow it. */
  heading(level: 1 | 2 | 3 | 4, text: string, keep = 60): void {
    const size = { 1: 18, 2: 13, 3: 10, 4: 8.5 }[level]
    const lines = linesOf([piece(text, { font: 'bold', size, colour: INK })], this.width, this.measure)
    const before = { 1: 0, 2: 16, 3: 10, 4: 7 }[level]
    this.ensure(Math.min(before + heightOf(lines) + keep, this.pageRoom))
    if (this.y > MARGIN.top) this.y += before
    if (level === 2) this.rule(0.9, INK, 5)
    this.#bookmark(level, text)
    this.flow(this.element(`H${level}`), lines, this.left)
    this.y += 3
  }

  /** A heading of level 2 on a band of its own, for what nobody may miss. */
  notice(text: string): void {
    const lines = linesOf(
      [piece(text, { font: 'bold', size: 12, colour: NOTICE.ink })],
      this.width - 20,
      this.measure,
    )
    const height = heightOf(lines) + 7
    this.ensure(height + 76)
    if (this.y > MARGIN.top) this.y += 14
    this.artifact(() => {
      this.doc.rect(this.left, this.y, this.width, height).fill(NOTICE.band)
      this.doc.rect(this.left, this.y, 5, height).fill(NOTICE.bar)
    })
    this.#bookmark(2, text)
    this.element('H2').add(() => this.drawLines(lines, this.left + 12, this.y + 3))
    this.y += height + 5
  }

  /** One item of a list: its label, then its text indented by `indent` points. */
  item(label: string, text: string, style: Style, indent: number): void {
    const lines = linesOf([piece(text, style)], this.width - indent, this.measure)
    this.ensure(lines[0]?.height ?? 0)
    const item = this.element('LI')
    const [mark] = linesOf([piece(label, style)], indent, this.measure)
    if (mark !== undefined) this.element('Lbl', {}, item).add(() => this.drawLines([mark], this.left, this.y))
    this.flow(this.element('LBody', {}, item), lines, this.left + indent)
    this.y += 2
  }

  #bookmark(level: number, text: string): void {
    const depth = Math.min(level, this.#outlines.length)
    const parent = this.#outlines[depth - 1]!
    const place = { fit: false, top: this.y - 6, left: this.doc.page.width, zoom: 0, expanded: level === 1 }
    const item = parent.addItem(text, place as { expanded: boolean })
    this.#outlines.length = depth
    this.#outlines.push(item)
  }

  /** A horizontal rule across the page. */
  rule(width: number, colour: string = FAINT, after = 4): void {
    this.artifact(() => {
      this.doc.lineWidth(width).moveTo(this.left, this.y).lineTo(this.right, this.y).stroke(colour)
    })
    this.y += after
  }

  /** A paragraph that flows over pages. `indent` in points. */
  paragraph(text: readonly Piece[] | string, style: Style = BODY, indent = 0, type = 'P', after = 4): void {
    const given = typeof text === 'string' ? [piece(text, style)] : text
    const lines = linesOf(given, this.width - indent, this.measure)
    this.flow(this.element(type), lines, this.left + indent)
    this.y += after
  }

  /** Draws lines as content of an element, page after page. */
  flow(element: Element, lines: readonly Line[], x: number): void {
    let rest = lines
    while (rest.length > 0) {
      this.ensure(rest[0]!.height)
      let count = 0
      let height = 0
      while (count < rest.length && height + rest[count]!.height <= this.room) height += rest[count++]!.height
      const now = rest.slice(0, Math.max(1, count))
      element.add(() => this.drawLines(now, x, this.y))
      this.y += heightOf(now)
      rest = rest.slice(now.length)
    }
  }

  /** Draws lines with their upper left corner at (x, y); `align` places them within `width`. */
  drawLines(lines: readonly Line[], x: number, y: number, width = 0, align: 'left' | 'right' = 'left'): void {
    let top = y
    for (const line of lines) {
      const start = align === 'right' ? x + width - line.width : x
      for (const one of line.pieces) {
        this.doc.font(one.font).fontSize(one.size).fillColor(one.colour)
        const place = { lineBreak: false, baseline: 'alphabetic' as const }
        this.doc.text(one.text, start + one.x, top + line.baseline - one.rise, place)
      }
      top += line.height
    }
  }

  /** Running title and page numbers, once the number of pages is known. */
  finish(title: string): void {
    const { count } = this.doc.bufferedPageRange()
    const style: Style = { font: 'sans', size: 7.5, colour: SOFT }
    const [running] = linesOf([piece(title, style)], this.width - 110, this.measure)
    for (let k = 0; k < count; k++) {
      this.doc.switchToPage(k)
      this.doc.markContent('Artifact', { type: 'Pagination' })
      if (running !== undefined) this.drawLines([running], this.left, 30)
      this.drawLines(
        linesOf([piece('feasibility memo', style)], 110, this.measure),
        this.right - 110,
        30,
        110,
        'right',
      )
      this.doc.lineWidth(0.5).moveTo(this.left, 43).lineTo(this.right, 43).stroke(FAINT)
      const number = linesOf([piece(`page ${k + 1} of ${count}`, style)], 110, this.measure)
      this.drawLines(number, this.right - 110, this.bottom + 16, 110, 'right')
      this.doc.endMarkedContent()
    }
  }
}

const NOTICE = { band: '#fbe9c6', bar: '#8f6200', ink: '#3d2a00' } as const

export const BODY: Style = { font: 'sans', size: 9, colour: INK }

export const heightOf = (lines: readonly Line[]): number => lines.reduce((sum, { height }) => sum + height, 0)

/** Measures with the document's own fonts; remembers what it measured as long as the document lives. */
function measureWith(doc: Doc): Measure {
  const known = new Map<string, number>()
  return (text: string, font: FontName, size: number): number => {
    const key = `${font}|${text}`
    const width = known.get(key)
    if (width !== undefined) return width * size
    const found = doc.font(font).fontSize(1).widthOfString(text)
    known.set(key, found)
    return found * size
  }
}

/**
 * Joins what a finished page holds into one stretch of bytes. All pages wait for their number to be known, and
 * the library keeps every drawing order of a page apart, which costs many times the memory.
 */
function condense({ content }: PDFKit.PDFPage): void {
  const { buffer } = content as unknown as { buffer?: unknown }
  if (!Array.isArray(buffer) || !buffer.every((part) => part instanceof Uint8Array)) return
  const whole = joinedBytes(buffer)
  buffer.splice(0, buffer.length, whole)
}
