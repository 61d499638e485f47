import type { Result } from '../verdict/result.ts'
import { bytesOf } from './bytes.ts'

/** From the result down to the steps of a check: what lies deeper stands on one line. */
const DEPTH_OF_A_STEP = 6
/** From a case down to the steps: as much text as is held at once. */
const DEPTH_OF_A_CASE = 4

/**
 * The result as JSON in UTF-8, one step of a derivation a line: a line by line comparison of two memos then
 * shows what moved, at half the size that indenting everything would take.
 */
export function resultJson(result: Result): Iterable<Uint8Array> {
  return {
    *[Symbol.iterator]() {
      for (const text of spread(result, DEPTH_OF_A_STEP)) yield bytesOf(text)
      yield bytesOf('\n')
    },
  }
}

/** The text in pieces: a long memo would take many times its size as one string. */
function* spread(value: unknown, depth: number): Generator<string> {
  if (depth === DEPTH_OF_A_CASE || typeof value !== 'object' || value === null) {
    yield lines(value, depth)
    return
  }
  const isList = Array.isArray(value)
  const entries = Object.entries(value).filter(([, one]) => one !== undefined)
  yield isList ? '[' : '{'
  for (const [k, [key, one]] of entries.entries()) {
    yield `${k === 0 ? '' : ','}\n${isList ? '' : `${JSON.stringify(key)}: `}`
    yield* spread(one, depth - 1)
  }
  yield `${entries.length === 0 ? '' : '\n'}${isList ? ']' : '}'}`
}

function lines(value: unknown, depth: number): string {
  if (depth === 0 || typeof value !== 'object' || value === null) return JSON.stringify(value)
  const isList = Array.isArray(value)
  const entries = Object.entries(value).filter(([, one]) => one !== undefined)
  const all = entries.map(
    ([key, one]) => `${isList ? '' : `${JSON.stringify(key)}: `}${lines(one, depth - 1)}`,
  )
  const inner = all.length === 0 ? '' : `\n${all.join(',\n')}\n`
  return isList ? `[${inner}]` : `{${inner}}`
}
