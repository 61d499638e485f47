/** Codes of `[` and `{`; those of `]` and `}` are two higher. */
const OPEN_LIST = 0x5b
const OPEN_MAP = 0x7b

/** Indicators that open a level on their own line: `- - - x` is three lists. Tags and anchors may stand before. */
const INDICATOR = /[ \t]*(?:[&!]\S*[ \t]+)*([-?:])(?=\s|$)/y

/**
 * Whether a YAML text nests deeper than a parser should be sent: running out of stack may end the process and not
 * only the parsing. Counted on the characters alone, brackets inside quotes and comments too, so the limit must be
 * generous.
 *
 * @param text YAML
 * @param limit levels of brackets, and levels of indentation, that are let through
 * @returns offsets at which each level of the deep place opens, outermost first; null when it is not that deep
 */
export function deepNesting(text: string, limit: number): readonly number[] | null {
  return deepBrackets(text, limit) ?? deepBlocks(text, limit)
}

function deepBrackets(text: string, limit: number): readonly number[] | null {
  const open: number[] = []
  for (let k = 0; k < text.length; k++) {
    const sign = text.charCodeAt(k)
    if (sign === OPEN_LIST || sign === OPEN_MAP) {
      open.push(k)
      if (open.length > limit) return open
    } else if (sign === OPEN_LIST + 2 || sign === OPEN_MAP + 2) open.pop()
  }
  return null
}

/** A level is a column further right than the one it stands in. */
function deepBlocks(text: string, limit: number): readonly number[] | null {
  const open: { readonly column: number; readonly at: number }[] = []
  for (let start = 0; start < text.length; start = nextLine(text, start)) {
    for (const at of levelsOf(text, start)) {
      const column = at - start
      while (open.length > 0 && open.at(-1)!.column > column) open.pop()
      if (open.at(-1)?.column !== column) open.push({ column, at })
      if (open.length > limit) return open.map((one) => one.at)
    }
  }
  return null
}

function nextLine(text: string, from: number): number {
  const end = text.indexOf('\n', from)
  return end < 0 ? text.length : end + 1
}

/** Offsets of the indicators at the head of a line and of what follows them. */
function levelsOf(text: string, start: number): readonly number[] {
  const levels: number[] = []
  let at = start
  INDICATOR.lastIndex = at
  for (let found = INDICATOR.exec(text); found !== null; found = INDICATOR.exec(text)) {
    at = INDICATOR.lastIndex
    levels.push(at - 1)
  }
  while (text[at] === ' ' || text[at] === '\t') at++
  const sign = text[at]
  return sign === undefined || sign === '\n' || sign === '\r' || sign === '#' ? levels : [...levels, at]
}
