import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { type MemoFormat, type MemoResources, makeMemo } from '../../src/memo/write.ts'
import type { Result } from '../../src/verdict/result.ts'
import { ROOT } from '../house/repository.ts'
import { demoFile, resultOf } from '../verdict/demos.ts'

/** Invented setting: small, with passes, fails, unknowns and things not asked. */
const SMALL = `format: 1
title: Sampling clock for a small card
question: Does a ring do?
revision: C
date: 2027-03-08
authors: [Ingrid Vestergaard (invented)]
notes: Invented setting, for tests.
block: clock
oscillator: {kind: LC, range: [10 GHz, 11 GHz]}
loop: {reference: 100 MHz, floor: -226 dBc/Hz, lock_time: 40 µs}
jitter_budget: {random: 150 fs, total: 10 ps}
power_budget: 30 mW
nodes: [P130, P28]
options:
  - {id: lc, label: LC oscillator}
  - {id: ring, label: Ring of four stages, oscillator: {kind: ring}}
`

/** The small scenario, evaluated with derivations. */
export const smallResult = (): Promise<Result> => resultOf(SMALL, demoFile('small.yaml'), true)

const FONTS = { sans: 'DejaVuSans.ttf', bold: 'DejaVuSans-Bold.ttf', mono: 'DejaVuSansMono.ttf' } as const

/** The package's own templates and fonts. */
export const resources: MemoResources = {
  templates: Object.fromEntries(
    readdirSync(join(ROOT, 'templates'))
      .filter((name) => name.endsWith('.hbs'))
      .map((name) => [name.replace('.hbs', ''), readFileSync(join(ROOT, 'templates', name), 'utf8')]),
  ),
  fonts: (name) => readFileSync(join(ROOT, 'node_modules/dejavu-fonts-ttf/ttf', FONTS[name])),
  paper: 'a4',
}

/** One file of the memo, as bytes. */
export async function bytesAs(result: Result, format: MemoFormat, more = resources): Promise<Buffer> {
  const [first] = await makeMemo(result, [format], more)
  return Buffer.concat([...first!.content])
}

/** One file of the memo, as text. */
export const textAs = async (result: Result, format: MemoFormat): Promise<string> =>
  (await bytesAs(result, format)).toString('utf8')
