import { describe, expect, it } from 'vitest'
import { clean } from '../../src/memo/text/clean.ts'
import type { Result } from '../../src/verdict/result.ts'
import { aCheck, aResult } from '../cli/a-result.ts'
import { bytesAs, textAs } from './a-memo.ts'
import { readPdf } from './read-pdf.ts'

const EVIL = '</style><script>alert(1)</script><img src=x onerror=alert(1)>{{title}}\u202egnp\u0007\u200b'

// biome-ignore lint/suspicious/noControlCharactersInRegex: these are what must not come through
const HIDDEN = /[\u0000-\u0008\u200b\u202e]/

function evil(): Result {
  const plain = aResult(['a'], ['P28'])
  const step = {
    id: 's1',
    kind: 'kernel' as const,
    symbol: EVIL,
    meaning: EVIL,
    formula: EVIL,
    inputs: {},
    from: {},
    value: 1,
    unit: '1',
    source: EVIL,
    path: EVIL,
  }
  const check = aCheck('tight', 1.01, {
    title: EVIL,
    quantity: EVIL,
    basis: EVIL,
    reason: EVIL,
    steps: [step],
  })
  return {
    ...plain,
    scenario: {
      ...plain.scenario,
      title: EVIL,
      question: EVIL,
      notes: EVIL,
      authors: [EVIL],
      revision: EVIL,
    },
    options: plain.options.map((one) => ({ ...one, label: EVIL })),
    nodes: plain.nodes.map((one) => ({ ...one, label: EVIL })),
    inputs: [{ file: `/srv/somebody/${EVIL}`, sha256: 'a'.repeat(64) }],
    assumptions: [
      { path: EVIL, value: EVIL, unit: EVIL, source: EVIL, evidence: EVIL, origin: 'scenario' },
      { path: 'nodes.P28.kind', value: EVIL, unit: '1', source: EVIL, evidence: EVIL, origin: 'node' },
    ],
    cases: plain.cases.map((one) => ({
      ...one,
      checks: [check],
      notExamined: [{ subBlock: 'x', title: EVIL, reason: EVIL }],
    })),
    answer: { ...plain.answer, sentence: EVIL },
  }
}

describe('text from files', () => {
  it('never becomes markup, style, template or hidden direction in the HTML', async () => {
    const html = await textAs(evil(), 'html')
    expect(html).toContain('&lt;script&gt;')
    expect(html).not.toMatch(/<script|<img/)
    expect(html.match(/<\/style>/g)).toHaveLength(1)
    expect(html).toContain('{{title}}')
    expect(html).not.toMatch(HIDDEN)
    expect(html).not.toContain('/srv/somebody')
  })

  it('neither in the PDF nor in the CSV', async () => {
    const { text, raw } = readPdf(await bytesAs(evil(), 'pdf'))
    expect(text.join(' ')).toContain('</style><script>alert(1)</script>')
    expect(text.join(' ')).not.toMatch(HIDDEN)
    expect(raw).not.toMatch(/\/JavaScript|\/JS\b|\/Launch|\/URI/)
    expect(await textAs(evil(), 'csv')).not.toMatch(HIDDEN)
  })

  it('loses only what nobody can see', () => {
    expect(clean('a\u202eb\u0000c\u200bd')).toBe('abcd')
    expect(clean('one\r\n\ttwo\u2028three')).toBe('one two three')
    expect(clean('µ Ω 電 🙂 é')).toBe('µ Ω 電 🙂 é')
    expect(clean('\ud800x')).toBe('x')
  })
})

describe('long text', () => {
  it('flows over pages of the PDF whole, in headings, paragraphs and tables', async () => {
    const long = Array.from({ length: 1500 }, (_, k) => `w${k}`).join(' ')
    const plain = aResult(['a'], ['P28'])
    const result: Result = {
      ...plain,
      scenario: { ...plain.scenario, title: long, question: long, notes: long },
      options: plain.options.map((one) => ({ ...one, label: long })),
      cases: plain.cases.map((one) => ({
        ...one,
        checks: [aCheck('unknown', null, { title: long, reason: long })],
      })),
    }
    const { text, pages } = readPdf(await bytesAs(result, 'pdf'))
    expect(pages).toBeGreaterThan(10)
    const counts = new Map<string, number>()
    for (const word of text.join(' ').split(' ')) counts.set(word, (counts.get(word) ?? 0) + 1)
    for (const k of [0, 700, 1499]) expect(counts.get(`w${k}`)).toBeGreaterThanOrEqual(6)
  }, 20_000)
})
