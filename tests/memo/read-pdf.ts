import { inflateSync } from 'node:zlib'

/** What a reader program finds in a PDF, read from the bytes alone (ISO 32000: objects, streams, ToUnicode maps). */
export interface ReadPdf {
  readonly raw: string
  readonly pages: number
  /** Text page by page, in the order it was drawn. */
  readonly text: readonly string[]
  /** Names of embedded fonts. */
  readonly fonts: readonly string[]
}

interface PdfObject {
  readonly head: string
  readonly body: Buffer | null
}

/** Reads a file that was written with an ordinary cross-reference table. */
export function readPdf(bytes: Buffer): ReadPdf {
  const raw = bytes.toString('latin1')
  const objects = objectsOf(raw)
  const pages = [...objects.values()].filter(({ head }) => /\/Type \/Page\b(?!s)/.test(head))
  const maps = new Map<string, ReadonlyMap<string, string>>()
  return {
    raw,
    pages: pages.length,
    text: pages.map((page) => pageText(page, objects, maps)),
    fonts: [...objects.values()].flatMap(({ head }) =>
      /\/FontFile2 \d+ 0 R/.test(head) ? (/\/FontName \/(\S+)/.exec(head)?.slice(1) ?? []) : [],
    ),
  }
}

function objectsOf(raw: string): ReadonlyMap<string, PdfObject> {
  const objects = new Map<string, PdfObject>()
  for (const [, id, content] of raw.matchAll(/(?:^|\n)(\d+) 0 obj\n([\s\S]*?)\nendobj/g)) {
    const at = content!.indexOf('\nstream\n')
    const head = at < 0 ? content! : content!.slice(0, at)
    const packed =
      at < 0 ? null : Buffer.from(content!.slice(at + 8, content!.lastIndexOf('\nendstream')), 'latin1')
    const isFlate = head.includes('/FlateDecode')
    objects.set(id!, { head, body: packed !== null && isFlate ? inflateSync(packed) : packed })
  }
  return objects
}

function pageText(
  page: PdfObject,
  objects: ReadonlyMap<string, PdfObject>,
  maps: Map<string, ReadonlyMap<string, string>>,
): string {
  const content = objects.get(/\/Contents (\d+)/.exec(page.head)![1]!)!.body!.toString('latin1')
  const shared = objects.get(/\/Resources (\d+)/.exec(page.head)?.[1] ?? '')?.head ?? page.head
  const fonts = new Map([...shared.matchAll(/\/(F\d+) (\d+) 0 R/g)].map(([, name, id]) => [name!, id!]))
  const words: string[] = []
  let map: ReadonlyMap<string, string> = new Map()
  for (const [, font, shown] of content.matchAll(/\/(F\d+) [\d.]+ Tf|\[((?:<[0-9a-f]*>|[-\d. ])*)\] TJ/g)) {
    if (font !== undefined) map = mapOf(fonts.get(font)!, objects, maps)
    else {
      const codes = [...shown!.matchAll(/<([0-9a-f]*)>/g)].map(([, hex]) => hex).join('')
      words.push((codes.match(/.{4}/g) ?? []).map((code) => map.get(code) ?? '\ufffd').join(''))
    }
  }
  return words.join(' ').replace(/\s+/g, ' ')
}

function mapOf(
  font: string,
  objects: ReadonlyMap<string, PdfObject>,
  maps: Map<string, ReadonlyMap<string, string>>,
): ReadonlyMap<string, string> {
  const known = maps.get(font)
  if (known !== undefined) return known
  const id = /\/ToUnicode (\d+)/.exec(objects.get(font)!.head)![1]!
  const map = new Map<string, string>()
  const ranges = objects.get(id)!.body!.toString('latin1')
  for (const [, from, list] of ranges.matchAll(/<([0-9a-f]{4})> <[0-9a-f]{4}> \[([^\]]*)\]/g)) {
    for (const [k, [, hex]] of [...list!.matchAll(/<([^>]*)>/g)].entries()) {
      const units = hex!.split(' ').filter((unit) => unit !== '')
      const code = (Number.parseInt(from!, 16) + k).toString(16).padStart(4, '0')
      map.set(code, String.fromCharCode(...units.map((unit) => Number.parseInt(unit, 16))))
    }
  }
  maps.set(font, map)
  return map
}
