import { beforeAll, describe, expect, it } from 'vitest'
import { marginText } from '../../src/memo/text/margin.ts'
import { makeMemo } from '../../src/memo/write.ts'
import type { Result } from '../../src/verdict/result.ts'
import { bytesAs, resources, smallResult, textAs } from './a-memo.ts'
import { type ReadPdf, readPdf } from './read-pdf.ts'

let result: Result
let html: string
let pdf: ReadPdf
let paper: string

beforeAll(async () => {
  result = await smallResult()
  html = await textAs(result, 'html')
  pdf = readPdf(await bytesAs(result, 'pdf'))
  paper = pdf.text.join(' ')
}, 30_000)

const words = (text: string): string =>
  text
    .replace(/<[^>]*>/g, ' ')
    .replace(/&amp;/g, '&')
    .replace(/&#x27;|&#39;/g, "'")
    .replace(/\s+/g, ' ')

describe('every format', () => {
  it('law: the same result gives the same bytes', async () => {
    const formats = ['html', 'pdf', 'json', 'csv'] as const
    const [one, two] = [
      await makeMemo(result, formats, resources),
      await makeMemo(result, formats, resources),
    ]
    expect(one.map(({ ending }) => ending)).toEqual(['html', 'pdf', 'json', 'csv', 'assumptions.csv'])
    one.forEach(({ ending, content }, k) => {
      const bytes = Buffer.concat([...content])
      expect(bytes.length, ending).toBeGreaterThan(500)
      expect(Buffer.compare(bytes, Buffer.concat([...two[k]!.content])), ending).toBe(0)
    })
  })

  it('the JSON is the result, key by key in the same order', async () => {
    expect(JSON.stringify(JSON.parse(await textAs(result, 'json')))).toBe(JSON.stringify(result))
  })

  it('law: grid cells carry the verdict and the margin of the JSON', () => {
    expect(result.cases).toHaveLength(4)
    for (const { option, node, verdict, margin } of result.cases) {
      const shown = marginText(margin, result.guard)
      expect(html).toContain(`aria-label="${option} in ${node}: ${verdict}, margin ${shown}"`)
      expect(Math.abs(Number(shown) - margin!)).toBeLessThanOrEqual(0.0051)
      expect(paper).toContain(`${verdict} ${shown}`)
    }
  })

  it('shows the answer, what was not examined, and what is unknown with its reason', () => {
    const unknown = result.cases.flatMap(({ checks }) =>
      checks.filter(({ verdict }) => verdict === 'unknown'),
    )
    const left = result.cases.flatMap(({ notExamined }) => notExamined)
    expect(unknown.length).toBeGreaterThan(0)
    expect(left.length).toBeGreaterThan(0)
    for (const text of [words(html), paper]) {
      expect(text).toContain(result.answer.sentence)
      for (const { title, reason } of left) {
        expect(text).toContain(title)
        expect(text).toContain(reason)
      }
      for (const { title, reason } of unknown) {
        expect(text).toContain(title)
        expect(text).toContain(reason)
      }
    }
  })
})

const SECTIONS = [
  'Answer',
  'What limits each case',
  'Not examined',
  'Unknown',
  'Required and available device speed',
  'Margins of all checks',
  'Headroom',
  'Clock: phase noise and jitter',
  'All checks',
  'Assumptions',
  'Derivations',
  'Cautions',
  'Sign-off',
  'Inputs and sources',
]

describe('HTML', () => {
  it('has every section, named and linked', () => {
    for (const section of SECTIONS) expect(html).toMatch(new RegExp(`<h2 id="[^"]+">${section}</h2>`))
    const ids = [...html.matchAll(/ id="([^"]+)"/g)].map(([, id]) => id)
    expect(new Set(ids).size).toBe(ids.length)
    const targets = [...html.matchAll(/href="#([^"]+)"/g)].map(([, id]) => id!)
    expect(targets.length).toBeGreaterThan(100)
    expect(targets.filter((id) => !ids.includes(id))).toEqual([])
  }, 20_000)

  it('has the derivation of every check that has one, with its formulas as they ran', () => {
    const derived = result.cases.flatMap(({ checks }) => checks.filter(({ steps }) => steps.length > 0))
    expect(html.match(/<details id=/g)).toHaveLength(derived.length)
    expect(words(html)).toContain('k B ·T / q e')
  })

  it('is one file without script or outside resource, and says its language', () => {
    expect(html).not.toMatch(/<script|<link|\bsrc=|@import|url\(|\son\w+=/i)
    expect(html.replace(/http:\/\/www\.w3\.org\/2000\/svg/g, '')).not.toMatch(/https?:\/\//)
    expect(html).toContain('<html lang="en-GB">')
    for (const part of [
      '<main>',
      '<header>',
      '<nav aria-label',
      'class="skip"',
      'prefers-color-scheme: dark',
    ])
      expect(html).toContain(part)
    expect(html.match(/<table/g)!.length).toBe(html.match(/<caption/g)!.length)
    expect(html).not.toMatch(/<th(?![^>]*scope)[ >]/)
  })

  it('lists every assumption with its origin', () => {
    const text = words(html)
    for (const { path, source } of result.assumptions) {
      expect(text).toContain(` ${path} `)
      expect(source).not.toBe('')
    }
    expect(html.match(/class="marked"/g)!.length).toBe(
      result.assumptions.filter(
        ({ origin, evidence }) => origin === 'default' || evidence === 'estimate' || evidence === 'invented',
      ).length,
    )
  }, 20_000)
})

describe('PDF', () => {
  it('is tagged, has an outline, a language, a title and embedded fonts', () => {
    for (const part of [
      '/StructTreeRoot',
      '/Outlines',
      '/Lang (en-GB)',
      '/DisplayDocTitle true',
      '/Marked true',
    ])
      expect(pdf.raw).toContain(part)
    for (const type of ['H1', 'H2', 'H3', 'Table', 'TR', 'TH', 'TD', 'Figure', 'L', 'LI', 'P'])
      expect(pdf.raw).toMatch(new RegExp(`/S /${type}\\n`))
    expect(pdf.raw).toContain('/Scope /Column')
    expect(pdf.fonts.map((name) => name.replace(/^\w+\+/, '')).sort()).toEqual([
      'DejaVuSans',
      'DejaVuSans-Bold',
      'DejaVuSansMono',
    ])
    expect(pdf.raw).not.toMatch(/\/Subtype \/Image|\/BaseFont \/Helvetica/)
    const figures = pdf.raw.match(/\/S \/Figure\n/g)!.length
    expect(figures).toBeGreaterThanOrEqual(3)
    expect(pdf.raw.match(/\/Alt /g)).toHaveLength(figures)
  })

  it('has every section, and page x of y on every page', () => {
    for (const section of SECTIONS) expect(paper).toContain(section)
    expect(pdf.pages).toBeGreaterThan(5)
    pdf.text.forEach((text, k) => {
      expect(text).toContain(`page ${k + 1} of ${pdf.pages}`)
      expect(text).toContain(result.scenario.title)
    })
  })

  it('has a glyph for every character it shows', () => {
    expect(paper).not.toContain('\ufffd')
    for (const sign of ['●', '✕', 'µ', '√', '·', '×', '−', '°']) expect(paper).toContain(sign)
  })

  it('is dated by the scenario, or by a constant when there is no date', async () => {
    expect(pdf.raw).toContain('D:20270308000000Z')
    const undated = { ...result, scenario: { ...result.scenario, date: null } }
    const letter = readPdf(await bytesAs(undated, 'pdf', { ...resources, paper: 'letter' }))
    expect(letter.raw).toContain('D:20000101000000Z')
    expect(letter.raw).toContain('/MediaBox [0 0 612 792]')
    expect(pdf.raw).toMatch(/\/MediaBox \[0 0 595\.28\d* 841\.89/)
  })
})
