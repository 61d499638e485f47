import { type Document, LineCounter, parseDocument } from 'yaml'
import { type Fault, faultAt, type Place } from './fault.ts'
import type { Tree } from './tree.ts'
import { DEEPEST, tooDeep, walkDocument } from './yaml-walk.ts'

const LARGEST = 1024 * 1024
/** Codes of `[` and `{`; those of `]` and `}` are two higher. */
const OPEN_LIST = 0x5b
const OPEN_MAP = 0x7b
/** A text that is no YAML breaks on every line; the first few faults tell it. */
const MOST_SYNTAX_FAULTS = 20

/**
 * Reads YAML 1.2 (or JSON) into a tree with places.
 *
 * @param text content of the file
 * @param file its name for messages
 * @returns the tree, and every fault of form found; null where the text cannot be read far enough to check more
 */
export function yamlTree(
  text: string,
  file: string,
): { readonly tree: Tree | null; readonly faults: readonly Fault[] } {
  const whole: Place = { file, line: 1, column: 1 }
  const refused = refusal(text, whole)
  if (refused !== null) return { tree: null, faults: [refused] }
  const lines = new LineCounter()
  const document = parsed(text.replace(/^\uFEFF/, ''), lines)
  if (document === null) return { tree: null, faults: [tooDeep(whole)] }
  const placeOf = (offset: number): Place => {
    const { line, col } = lines.linePos(offset)
    return { file, line: Math.max(1, line), column: Math.max(1, col) }
  }
  const faults = document.errors
    .slice(0, MOST_SYNTAX_FAULTS)
    .map((error) => syntaxFault(error.code, error.message, placeOf(error.pos[0])))
  if (faults.length > 0) return { tree: null, faults }
  if (document.contents === null) return { tree: null, faults: [emptyFile(whole)] }
  return walkDocument(document, placeOf, whole)
}

function refusal(text: string, whole: Place): Fault | null {
  if (text.length > LARGEST) {
    return faultAt(
      whole,
      'file.too-large',
      `${text.length} characters`,
      `at most ${LARGEST}`,
      'keep bulk data in files of their own',
    )
  }
  // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is looked for
  const strange = text.search(/[\u0000-\u0008\u000e-\u001f\ufffd]/)
  if (strange >= 0) {
    const before = text.slice(0, strange).split('\n')
    return faultAt(
      { ...whole, line: before.length, column: before.at(-1)!.length + 1 },
      'file.binary',
      `a byte that is no text (${text.charCodeAt(strange).toString(16).padStart(4, '0')} hex)`,
      'UTF-8 text',
      'save the file as UTF-8 text',
    )
  }
  return text.trim().replace(/^\uFEFF/, '') === '' ? emptyFile(whole) : null
}

const emptyFile = (whole: Place): Fault =>
  faultAt(
    whole,
    'file.empty',
    'an empty file',
    'a mapping of keys',
    'begin with `format: 1`, or take a starter',
  )

function parsed(text: string, lineCounter: LineCounter): Document.Parsed | null {
  if (deepestBracket(text) > DEEPEST * 4) return null
  try {
    return parseDocument(text, {
      lineCounter,
      prettyErrors: false,
      version: '1.2',
      schema: 'core',
      // Found while walking: the parser compares every pair of keys, which a file of many keys makes slow.
      uniqueKeys: false,
      logLevel: 'error',
    }) as Document.Parsed
  } catch {
    return null
  }
}

/** How deep brackets nest, so that the parser is never sent down a bottomless text. */
function deepestBracket(text: string): number {
  let [depth, deepest] = [0, 0]
  for (let k = 0; k < text.length; k++) {
    const sign = text.charCodeAt(k)
    if (sign === OPEN_LIST || sign === OPEN_MAP) deepest = Math.max(deepest, ++depth)
    else if (sign === OPEN_LIST + 2 || sign === OPEN_MAP + 2) depth--
  }
  return deepest
}

function syntaxFault(code: string, message: string, place: Place): Fault {
  const said = (message.split('\n')[0] ?? message).replace(/ at line \d+.*$/, '')
  // A text nested without end runs the parser out of stack, which it reports as an error of the text.
  if (/call stack/i.test(said)) return tooDeep(place)
  if (code === 'MULTIPLE_DOCS')
    return faultAt(
      place,
      'yaml.documents',
      'a second document',
      'one document a file',
      'split the file at `---`',
    )
  return faultAt(
    place,
    'yaml.syntax',
    said,
    'valid YAML 1.2',
    'check indentation, quotes, colons and brackets here',
  )
}
