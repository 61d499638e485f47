import type { Figure } from '../figure/figure.ts'
import { toPdf } from '../figure/pdf.ts'
import type { MemoModel } from '../model/memo-model.ts'
import type { Sheet } from './sheet.ts'
import { quiet } from './styles.ts'

/** Required and available device speed, and the margins of all checks. */
export function writeFigures(sheet: Sheet, { speed, margins }: MemoModel): void {
  sheet.heading(2, 'Required and available device speed', roomFor(sheet, speed[0]) + 40)
  if (speed.length === 0) sheet.paragraph('No check of this scenario compares device speed.')
  else {
    sheet.paragraph(
      'Bars show the transit frequency that each sub-block can use at its own worst operating point and under its own stack and supply; the upright stroke shows what it needs. All figures share one axis.',
    )
  }
  for (const figure of speed) drawFigure(sheet, figure)
  sheet.heading(2, 'Margins of all checks', roomFor(sheet, margins))
  drawFigure(sheet, margins)
}

const CAPTION = 16

/** Height that a figure and its caption take [pt]; 0 without one. */
export function roomFor(sheet: Sheet, figure: Figure | undefined): number {
  return figure === undefined ? 0 : figure.height * factorOf(sheet, figure) + CAPTION
}

/** Full width, unless the figure would then be taller than a page. */
function factorOf({ width, pageRoom }: Sheet, figure: Figure): number {
  return Math.min(width / figure.width, (pageRoom - 80) / figure.height)
}

/** Draws a figure with its caption. */
export function drawFigure(sheet: Sheet, figure: Figure): void {
  const factor = factorOf(sheet, figure)
  const height = figure.height * factor
  sheet.ensure(height + CAPTION)
  const { left, y } = sheet
  const bbox = [left, y, left + figure.width * factor, y + height]
  const alt = `${figure.title}. ${figure.description}`
  sheet
    .element('Figure', { alt, bbox, title: figure.title })
    .add(() => toPdf(sheet.pen, figure, left, y, factor))
  sheet.y += height
  sheet.paragraph(figure.title, quiet(7.5), 0, 'P', 10)
}
