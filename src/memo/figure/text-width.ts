/**
 * Width of a text in points, on the safe side: figures are laid out without a font at hand. Advance widths
 * are those of a wide sans-serif in four classes.
 */
export function textWidth(text: string, size: number): number {
  let width = 0
  for (const c of text)
    width += /[iljtfrI.,:;'|! ()]/.test(c) ? 0.4 : /[mwMW%@…]/.test(c) ? 0.98 : /[A-Z]/.test(c) ? 0.73 : 0.64
  return width * size
}

/** The text, cut with an ellipsis where it would not fit. */
export function fitted(text: string, size: number, width: number): string {
  if (textWidth(text, size) <= width) return text
  const letters = [...text]
  while (letters.length > 1 && textWidth(`${letters.join('')}…`, size) > width) letters.pop()
  return `${letters.join('').trimEnd()}…`
}
