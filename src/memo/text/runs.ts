/** A stretch of text on one level: base line, subscript or superscript. */
export interface Run {
  readonly text: string
  readonly level: 'base' | 'sub' | 'sup'
}

/** Text with subscripts and superscripts. */
export type Runs = readonly Run[]

export const base = (text: string): Run => ({ text, level: 'base' })
export const sub = (text: string): Run => ({ text, level: 'sub' })
export const sup = (text: string): Run => ({ text, level: 'sup' })

/** Neighbours on the same level become one run. */
export function joined(runs: Runs): Runs {
  const out: Run[] = []
  for (const run of runs) {
    const last = out[out.length - 1]
    if (last !== undefined && last.level === run.level)
      out[out.length - 1] = { ...run, text: last.text + run.text }
    else if (run.text !== '') out.push(run)
  }
  return out
}

/** The runs as plain text: subscripts after an underscore, superscripts after a caret. */
export function plain(runs: Runs): string {
  return runs
    .map(({ text, level }) => (level === 'base' ? text : `${level === 'sub' ? '_' : '^'}${text}`))
    .join('')
}
