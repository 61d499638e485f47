import { resolve } from 'node:path'
import { clean } from '../memo/text/clean.ts'
import { guidePage } from './guide-page.ts'
import { guideTables } from './guide-tables.ts'
import { DONE, type Io } from './io.ts'
import type { Tool } from './version.ts'

/** `tapeworthy guide`: writes the user's guide as one HTML file. Returns the exit status. */
export async function guide(options: { readonly out: string }, io: Io, tool: Tool): Promise<number> {
  const { default: handlebars } = await import('handlebars')
  const text = (name: string): string => {
    const file = io.files.shipped(`templates/guide/${name}.hbs`)
    if (!io.files.exists(file)) throw new Error(`the guide's chapter ${name} is missing from the package`)
    return io.files.readText(file)
  }
  const html = guidePage(handlebars.create(), text, { version: tool.version, ...guideTables(io) })
  io.files.writeAll([{ file: resolve(io.cwd, options.out), content: html }])
  io.stdout.write(`${clean(options.out)}\n`)
  return DONE
}
