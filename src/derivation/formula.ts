/**
 * A formula is written once, as a small arrow function over named SI numbers. The text that people read is
 * derived from that function's own source, so the formula shown is the formula that ran.
 */

/** What a reader needs to know about the value a formula yields. */
export interface About {
  /** Symbol in the field's notation, subscripts after an underscore: `f_T`, `V_DSsat`. */
  readonly symbol: string
  readonly meaning: string
  /** SI unit, `1` when dimensionless. */
  readonly unit: string
  /** Publication, `derived: …`, or `common practice, no source`. */
  readonly source: string
}

/** An arithmetic expression over named SI numbers, with what it means. */
export interface Formula<A extends readonly number[]> extends About {
  readonly run: (...args: A) => number
  readonly text: FormulaText
}

/** Declares a formula. The arrow function must be a single expression over its parameters. */
export function formula<A extends number[]>(about: About, run: (...args: A) => number): Formula<A> {
  return { ...about, run, text: textOf(run) }
}

/** The parameters and the expression of a formula in the notation of mathjs (`^` for powers, `log` natural). */
export interface FormulaText {
  readonly parameters: readonly string[]
  readonly expression: string
}

/**
 * Reads a formula's text out of its own function.
 * Errors: throws when the function is not a single-expression arrow function, a fault of the program.
 */
// biome-ignore lint/suspicious/noExplicitAny: any list of numbers will do
export function textOf(run: (...args: any[]) => number): FormulaText {
  const source = run.toString().replace(/\/\*[\s\S]*?\*\//g, ' ')
  const arrow = source.indexOf('=>')
  const head = source.slice(0, arrow).replace(/[()\s]/g, '')
  const body = source.slice(arrow + 2).trim()
  if (arrow < 0 || body.startsWith('{')) {
    throw new Error(`not a single-expression arrow function: ${source.slice(0, 80)}`)
  }
  const expression = body
    .replace(/\bMath\.PI\b/g, 'pi')
    .replace(/\bMath\./g, '')
    .replace(/\*\*/g, '^')
    .replace(/\s+/g, ' ')
    .replace(/\( /g, '(')
    .replace(/ \)/g, ')')
    .replace(/,\s*\)/g, ')')
    // Bundlers print 0.5 as .5: people read the former.
    .replace(/(?<![\w.])\.(?=\d)/g, '0.')
  return { parameters: head === '' ? [] : head.split(',').filter((name) => name !== ''), expression }
}
