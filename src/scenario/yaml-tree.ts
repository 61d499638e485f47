import { type Document, LineCounter, parseDocument } from 'yaml'
import { type Fault, faultAt, type Place } from './fault.ts'
import { deepNesting } from './nesting.ts'
import type { Tree } from './tree.ts'
import { DEEPEST, tooDeep, walkDocument } from './yaml-walk.ts'

/** In characters: a hundred times what a person writes, and read in moments even when every character is a fault. */
const LARGEST = 256 * 1024
/** Levels that are handed to the parser: well within its stack, and beyond what brackets in quotes add up to. */
const DEEPEST_PARSED = 4 * DEEPEST
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
  const plain = text.replace(/^\uFEFF/, '')
  const levels = deepNesting(plain, DEEPEST_PARSED)
  if (levels !== null) return { tree: null, faults: [tooDeep(placeIn(plain, levels[DEEPEST + 1]!, file))] }
  const document = parsed(plain, lines)
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

function placeIn(text: string, offset: number, file: string): Place {
  const before = text.slice(0, offset).split('\n')
  return { file, line: before.length, column: before.at(-1)!.length + 1 }
}

function refusal(text: string, whole: Place): Fault | null {
  if (text.length > LARGEST) {
    return faultAt(
      whole,
      'file.too-large',
      `${text.length} characters`,
      `at most ${LARGEST} characters`,
      'keep bulk data in files of their own',
    )
  }
  // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is looked for
  const strange = text.search(/[\u0000-\u0008\u000e-\u001f\ufffd]/)
  if (strange >= 0) {
    return faultAt(
      placeIn(text, strange, whole.file),
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
