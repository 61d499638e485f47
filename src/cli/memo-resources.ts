import { createRequire } from 'node:module'
import { join } from 'node:path'
import type { MemoResources } from '../memo/write.ts'
import type { Io } from './io.ts'

const FONTS = { sans: 'DejaVuSans.ttf', bold: 'DejaVuSans-Bold.ttf', mono: 'DejaVuSansMono.ttf' } as const

/** Templates and fonts of the memo, read from the package and its font package; fonts only when asked for. */
export function memoResources(io: Io, paper: 'a4' | 'letter'): MemoResources {
  const folder = io.files.shipped('templates')
  const templates = Object.fromEntries(
    io.files
      .list(folder)
      .filter((name) => name.endsWith('.hbs'))
      .map((name) => [name.replace(/\.hbs$/, ''), io.files.readText(join(folder, name))]),
  )
  const { resolve } = createRequire(import.meta.url)
  const fonts: MemoResources['fonts'] = (name) =>
    io.files.readBytes(resolve(`dejavu-fonts-ttf/ttf/${FONTS[name]}`))
  return { templates, fonts, paper }
}
