import type { Figure, Mark } from './figure.ts'

/**
 * A figure as an SVG element for a page: no style sheet, no script, no outside resource.
 *
 * @param figure primitives in points
 */
export function toSvg(figure: Figure): string {
  const { id, title, description, width, height, marks } = figure
  const head = `<svg xmlns="http://www.w3.org/2000/svg" role="img" aria-labelledby="${xml(id)}-t ${xml(id)}-d" viewBox="0 0 ${n(width)} ${n(height)}" width="${n(width)}" height="${n(height)}" font-family="DejaVu Sans, Verdana, sans-serif">`
  const words = `<title id="${xml(id)}-t">${xml(title)}</title><desc id="${xml(id)}-d">${xml(description)}</desc>`
  return `${head}${words}${marks.map(drawn).join('')}</svg>`
}

function drawn(mark: Mark): string {
  switch (mark.kind) {
    case 'rect':
      return `<rect x="${n(mark.x)}" y="${n(mark.y)}" width="${n(mark.width)}" height="${n(mark.height)}" fill="${xml(mark.fill)}"${line(mark.stroke, 0.75, mark.dash)}/>`
    case 'line':
      return `<line x1="${n(mark.x1)}" y1="${n(mark.y1)}" x2="${n(mark.x2)}" y2="${n(mark.y2)}"${line(mark.stroke, mark.width, mark.dash)}/>`
    case 'text':
      return `<text x="${n(mark.x)}" y="${n(mark.y)}" font-size="${n(mark.size)}" fill="${xml(mark.fill)}"${mark.anchor === 'start' ? '' : ` text-anchor="${mark.anchor}"`}${mark.bold === true ? ' font-weight="bold"' : ''}>${xml(mark.text)}</text>`
    case 'path':
      return `<path transform="translate(${n(mark.x)} ${n(mark.y)})" d="${xml(mark.d)}" fill="${xml(mark.fill ?? 'none')}"${line(mark.stroke, mark.width ?? 1, mark.dash)}/>`
  }
}

function line(stroke: string | undefined, width: number, dash?: readonly number[]): string {
  if (stroke === undefined) return ''
  return ` stroke="${xml(stroke)}" stroke-width="${n(width)}"${dash === undefined ? '' : ` stroke-dasharray="${dash.map(n).join(' ')}"`}`
}

const n = (value: number): string => String(Math.round(value * 1000) / 1000)

const NAMED: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
}
const xml = (text: string): string => text.replace(/[&<>"']/g, (c) => NAMED[c]!)
