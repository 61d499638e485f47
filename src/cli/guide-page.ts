import type Handlebars from 'handlebars'
import type { GuideTables } from './guide-tables.ts'

/** Chapters in reading order: template file and title. A chapter without its file is a fault of the package. */
export const CHAPTERS: readonly { readonly id: string; readonly title: string }[] = [
  { id: 'what-it-does', title: 'What it does and what it does not' },
  { id: 'ten-minutes', title: 'The first ten minutes' },
  { id: 'scenario-file', title: 'The scenario file' },
  { id: 'node-files', title: 'Node files' },
  { id: 'error-codes', title: 'Error codes' },
  { id: 'method-notes', title: 'Method notes' },
  { id: 'clocking', title: 'Clock, phase noise and jitter' },
  { id: 'hand-calculations', title: 'Hand calculations' },
]

/**
 * Puts the chapters together into one page.
 *
 * @param handlebars an environment of its own
 * @param text source of a template by name. Errors: throws when there is none
 * @param facts version of the tool and the tables made from its declarations
 * @returns self-contained HTML
 */
export function guidePage(
  handlebars: typeof Handlebars,
  text: (name: string) => string,
  facts: GuideTables & { readonly version: string },
): string {
  handlebars.registerPartial('key-table', text('key-table'))
  const render = (name: string, context: object): string =>
    handlebars.compile(text(name), { strict: true })(context)
  const chapters = CHAPTERS.map(({ id, title }, k) => {
    const html = render(id, facts)
    if (html.replace(/<!--[\s\S]*?-->/g, '').trim() === '')
      throw new Error(`the guide's chapter ${id} is empty`)
    return { id, title, number: k + 1, html }
  })
  return render('page', { ...facts, chapters })
}
