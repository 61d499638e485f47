import type { Runs } from '../text/runs.ts'

/** The embedded fonts, by name. */
export type FontName = 'sans' | 'bold' | 'mono'

/** How a text is set. Size in points. */
export interface Style {
  readonly font: FontName
  readonly size: number
  readonly colour: string
}

/** A stretch of text in one style; `rise` lifts or lowers it, in points. */
export interface Piece extends Style {
  readonly text: string
  readonly rise: number
}

/** A piece at its place on a line, x from the line's start. */
export interface PlacedPiece extends Piece {
  readonly x: number
}

export interface Line {
  readonly pieces: readonly PlacedPiece[]
  readonly width: number
  /** Height of the line and place of its base line below its top, in points. */
  readonly height: number
  readonly baseline: number
}

/** Width of a text in points. */
export type Measure = (text: string, font: FontName, size: number) => number

/** Runs in a style: subscripts lowered, superscripts raised, both smaller. */
export function pieces(runs: Runs, style: Style): readonly Piece[] {
  return runs.map(({ text, level }) => {
    if (level === 'base') return { ...style, text, rise: 0 }
    return { ...style, text, size: style.size * 0.74, rise: style.size * (level === 'sub' ? -0.18 : 0.34) }
  })
}

export const piece = (text: string, style: Style): Piece => ({ ...style, text, rise: 0 })

/** Everything between two places where a line may end. */
interface Word {
  readonly pieces: readonly Piece[]
  readonly width: number
  /** Width of the blank that follows. */
  readonly blank: number
}

/**
 * Breaks pieces into lines no wider than `width`. Breaks at blanks; a word that is wider than the line is
 * broken inside, so that nothing ever leaves its column.
 */
export function linesOf(given: readonly Piece[], width: number, measure: Measure): readonly Line[] {
  const words = wordsOf(given, measure).flatMap((word) =>
    word.width > width ? broken(word, width, measure) : [word],
  )
  const lines: Word[][] = [[]]
  let used = 0
  for (const word of words) {
    const current = lines[lines.length - 1]!
    const before = current[current.length - 1]?.blank ?? 0
    if (current.length > 0 && used + before + word.width > width + 0.01) {
      lines.push([word])
      used = word.width
    } else {
      current.push(word)
      used += before + word.width
    }
  }
  return lines.map((line) => placed(line, given[0]?.size ?? 8, measure))
}

/** Width of the widest unbreakable word and of the whole on one line. */
export function extent(
  given: readonly Piece[],
  measure: Measure,
): { readonly least: number; readonly most: number } {
  const words = wordsOf(given, measure)
  const most = words.reduce((sum, { width, blank }, k) => sum + width + (k < words.length - 1 ? blank : 0), 0)
  return { least: Math.max(0, ...words.map(({ width }) => width)), most }
}

function wordsOf(given: readonly Piece[], measure: Measure): readonly Word[] {
  const words: Word[] = []
  let open: Piece[] = []
  const close = (blank: number): void => {
    if (open.length > 0)
      words.push({ pieces: open, width: open.reduce((sum, p) => sum + wide(p, measure), 0), blank })
    open = []
  }
  for (const one of given) {
    const parts = one.text.split(/( +|(?<=[/.,_·-])(?=[A-Za-z0-9_]{4,}))/)
    // Every second part is a place to break: blanks, or nothing where a long name may be divided.
    parts.forEach((part, k) => {
      if (k % 2 === 1) close(part === '' ? 0 : wide({ ...one, text: ' ' }, measure))
      else if (part !== '') open.push({ ...one, text: part })
    })
  }
  close(0)
  return words
}

const wide = ({ text, font, size }: Piece, measure: Measure): number => measure(text, font, size)

function broken(word: Word, width: number, measure: Measure): readonly Word[] {
  const out: Word[] = []
  let open: Piece[] = []
  let used = 0
  const letters = word.pieces.flatMap((one) => [...one.text].map((text) => ({ ...one, text })))
  for (const letter of letters) {
    const step = wide(letter, measure)
    if (open.length > 0 && used + step > width) {
      out.push({ pieces: open, width: used, blank: 0 })
      open = []
      used = 0
    }
    open.push(letter)
    used += step
  }
  out.push({ pieces: open, width: used, blank: word.blank })
  return out
}

function placed(words: readonly Word[], size: number, measure: Measure): Line {
  const out: PlacedPiece[] = []
  let x = 0
  words.forEach((word, k) => {
    for (const one of word.pieces) {
      append(out, one, x)
      x += wide(one, measure)
    }
    const isLast = k === words.length - 1
    if (!isLast && word.blank > 0) {
      const last = out[out.length - 1]!
      out[out.length - 1] = { ...last, text: `${last.text} ` }
      x += word.blank
    }
  })
  const largest = Math.max(size, ...out.map((one) => one.size))
  const hasLevels = out.some(({ rise }) => rise !== 0)
  return { pieces: out, width: x, height: largest * (hasLevels ? 1.42 : 1.32), baseline: largest * 1.02 }
}

/** Neighbours of one style are drawn in one go. */
function append(out: PlacedPiece[], one: Piece, x: number): void {
  const last = out[out.length - 1]
  const alike =
    last !== undefined &&
    last.font === one.font &&
    last.size === one.size &&
    last.rise === one.rise &&
    last.colour === one.colour
  if (alike) out[out.length - 1] = { ...last, text: last.text + one.text }
  else out.push({ ...one, x })
}
