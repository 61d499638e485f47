/**
 * Breaks text at spaces so that no line is longer than `width`; the first line starts with `first`, others with
 * `rest`. Spaces that must not break are honoured and then written as plain ones.
 */
export function wrapped(text: string, width: number, first = '', rest = first): string {
  const lines: string[] = []
  let line = first
  let empty = true
  for (const word of text.split(' ')) {
    if (!empty && line.length + 1 + word.length > width) {
      lines.push(line)
      line = rest
      empty = true
    }
    line = empty ? `${line}${word}` : `${line} ${word}`
    empty = false
  }
  return [...lines, line].join('\n').replaceAll('\u00a0', ' ')
}
