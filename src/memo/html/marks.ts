import type { StepShown } from '../model/memo-model.ts'
import type { Runs } from '../text/runs.ts'

const NAMED: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
}

/** Text as HTML text. */
export function escaped(text: string): string {
  return text.replace(/[&<>"']/g, (c) => NAMED[c]!)
}

/** Runs as HTML with `sub` and `sup`. */
export function runsToHtml(runs: Runs): string {
  return runs
    .map(({ text, level }) => (level === 'base' ? escaped(text) : `<${level}>${escaped(text)}</${level}>`))
    .join('')
}

/** Text inside a quoted string of a style sheet: whatever is not a plain letter or digit is written by its number. */
export function cssText(text: string): string {
  return [...text].map((c) => (/[A-Za-z0-9 ]/.test(c) ? c : `\\${c.codePointAt(0)!.toString(16)} `)).join('')
}

/**
 * A step as a row: symbol, meaning, formula with numbers, value, source. A large memo has ten thousand of them,
 * so the columns are styled by their place and the end tags that HTML does not need are left out.
 */
export function stepRow(step: StepShown): string {
  const { symbol, meaning, value, source, yields } = step
  const role = yields === '' ? '' : ` <b>(${escaped(yields)})</b>`
  const head = `<tr${yields === '' ? '' : ' class=yields'}><th scope=row>${runsToHtml(symbol)}`
  const cells = [`${escaped(meaning)}${role}`, stepFormula(step), escaped(value)]
  return `${head}${cells.map((cell) => `<td>${cell}`).join('')}<td><a href="#s${source}">[${source}]</a>\n`
}

/** Symbol and value only, for a step that stands elsewhere in full. */
export function nameAndValue({ symbol, value }: StepShown): string {
  return `${runsToHtml(symbol)} = ${escaped(value)}`
}

/** The middle cell of a step: what was done, and with which numbers. */
function stepFormula({ kind, formula, substituted, tolerance, path }: StepShown): string {
  const after = tolerance === '' ? '' : ` (${escaped(tolerance)})`
  switch (kind) {
    case 'leaf':
      return `given${path === '' ? '' : ` as <code>${escaped(path)}</code>`}`
    case 'formula':
      return `= ${runsToHtml(formula)}<div>= ${runsToHtml(substituted)}</div>`
    case 'search':
      return `root of ${runsToHtml(formula)}${after}${given(substituted)}`
    case 'kernel':
      return `${runsToHtml(formula)}${after}${given(substituted)}`
  }
}

const given = (runs: Runs): string => (runs.length === 0 ? '' : `<div>with ${runsToHtml(runs)}</div>`)
