import handlebars from 'handlebars'
import { describe, expect, it } from 'vitest'
import { CHAPTERS, guidePage } from '../../src/cli/guide-page.ts'
import { guideTables } from '../../src/cli/guide-tables.ts'
import { textAt } from '../house/repository.ts'
import { openShell } from './shell.ts'

const shell = openShell()
shell.remove()
const facts = {
  version: '0.0.0',
  ...guideTables(
    shell.io(
      () => {},
      () => {},
    ),
  ),
}
const LAST = 'hand-calculations'
/** Every template as it is, the last chapter replaced by a text of the test. */
const templates =
  (last: string) =>
  (name: string): string =>
    name === LAST ? last : textAt(`templates/guide/${name}.hbs`)

describe('guide', () => {
  const html = guidePage(handlebars.create(), templates('<p>By hand.</p>'), facts)

  it('has every chapter in order, numbered, linked from the top', () => {
    const headings = [...html.matchAll(/<h2 id="([^"]+)">(\d+)\. ([^<]+)<\/h2>/g)]
    expect(headings.map(([, id, , title]) => ({ id, title }))).toEqual(CHAPTERS)
    expect(headings.map(([, , number]) => Number(number))).toEqual(CHAPTERS.map((_, k) => k + 1))
    for (const { id } of CHAPTERS) expect(html).toContain(`<a href="#${id}">`)
  })

  it('lists every key, code, class and sub-block', () => {
    const all = [
      ...facts.scenarioKeys.map(({ path }) => path),
      ...facts.nodeKeys.map(({ path }) => path),
      ...facts.faultCodes.map(({ code }) => code),
      ...facts.nodeClasses.map(({ id }) => id),
      ...facts.subBlocks.map(({ id }) => id),
    ]
    expect(all.length).toBeGreaterThan(200)
    expect(all.filter((one) => !html.includes(`>${one}<`))).toEqual([])
  })

  it('is whole by itself and leaves no placeholder', () => {
    expect(html).not.toMatch(/<script|<link|\bsrc=|@import|url\(|https?:\/\//)
    expect(html).not.toMatch(/\{\{|undefined|\[object/)
  })

  it('opens and closes every element in order (law)', () => {
    const open: string[] = []
    const void_ = new Set(['meta', 'br', 'hr', 'img', '!doctype'])
    for (const [, close, name] of html
      .replace(/<!--[\s\S]*?-->/g, '')
      .matchAll(/<(\/?)([a-zA-Z!][\w]*)[^>]*>/g)) {
      if (void_.has(name!.toLowerCase())) continue
      if (close === '') open.push(name!)
      else expect(open.pop()).toBe(name)
    }
    expect(open).toEqual([])
  })

  it('stops at a chapter that is missing or empty', () => {
    const missing = (name: string): string => {
      if (name === LAST) throw new Error('no such chapter')
      return templates('')(name)
    }
    expect(() => guidePage(handlebars.create(), missing, facts)).toThrow('no such chapter')
    expect(() => guidePage(handlebars.create(), templates(' <!-- later -->\n'), facts)).toThrow(
      `${LAST} is empty`,
    )
  })
})
