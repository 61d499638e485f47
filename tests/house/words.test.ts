import { describe, expect, it } from 'vitest'
import { filesBelow, textAt } from './repository.ts'

// The words are put together here so that this file does not hold them.
const word = (...parts: readonly string[]): string => parts.join('')

/** Whole words that say who or what wrote the code, or name a product instead of a principle. */
const WORDS = [
  word('cla', 'ude'),
  word('anth', 'ropic'),
  word('chat', 'gpt'),
  word('open', 'ai'),
  word('copi', 'lot'),
  word('l', 'lm'),
  word('syn', 'opsys'),
  word('key', 'sight'),
  word('virt', 'uoso'),
  word('fix', 'me'),
  word('to', 'do'),
]
/** Pieces of addresses and of places that exist on one machine only. */
const PLACES = [
  word('/wo', 'rk/'),
  word('/ho', 'me/'),
  word('/tm', 'p/'),
  word('/Us', 'ers/'),
  word('registry.', 'npm'),
  word('npmjs', '.org'),
  word('npmjs', '.com'),
  word('local', 'host:'),
]

const pattern = new RegExp(
  [
    ...WORDS.map((one) => `\\b${one}\\b`),
    ...PLACES.map((one) => one.replace(/[.]/g, '\\.')),
    // A number of a ticket.
    '\\b(?:issue|ticket)\\s*#?\\d+',
    '(?:^|\\s)#\\d{1,2}\\b',
  ].join('|'),
  'i',
)

const text = /\.(ts|mjs|js|json|ya?ml|md|hbs|html|css|csv|txt)$|(^|\/)(run|LICENSE)$/
const files = filesBelow('.').filter((path) => text.test(path) && path !== 'package-lock.json')

function found(path: string): readonly string[] {
  return textAt(path)
    .split('\n')
    .flatMap((line, k) => {
      const hit = pattern.exec(line)
      return hit === null ? [] : [`${path}:${k + 1}: ${hit[0].trim()}`]
    })
}

describe('words', () => {
  it('no file tells who wrote it, where it was written or which ticket asked for it', () => {
    expect(files.length).toBeGreaterThan(50)
    expect(files.flatMap(found)).toEqual([])
  })

  it('would notice them', () => {
    for (const one of [...WORDS, ...PLACES, word('see is', 'sue 4')])
      expect(pattern.test(`a ${one} b`)).toBe(true)
    expect(pattern.test('the pole at 3 GHz, twelve taps and a tail of 1/f²')).toBe(false)
  })
})
