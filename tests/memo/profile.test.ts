import { describe, expect, it } from 'vitest'
import { clockText } from '../clocking/scenarios.ts'
import { demoFile, resultOf } from '../verdict/demos.ts'
import { bytesAs, textAs } from './a-memo.ts'

const OSCILLATOR = '[[1 kHz, -30 dBc/Hz], [100 kHz, -88 dBc/Hz], [1 MHz, -112 dBc/Hz], [1 GHz, -160 dBc/Hz]]'
const REFERENCE = '[[1 kHz, -140 dBc/Hz], [10 kHz, -150 dBc/Hz], [50 MHz, -160 dBc/Hz]]'

const withProfiles = () =>
  resultOf(
    clockText({
      oscillator: `{kind: LC, range: [9.5 GHz, 10.5 GHz], phase_noise: ${OSCILLATOR}}`,
      loop: `{reference: 100 MHz, reference_noise: ${REFERENCE}}`,
    }),
    demoFile('measured.yaml'),
    true,
  )

describe('a memo on measured profiles', () => {
  it('lists each profile by its rows and ends', async () => {
    const html = (await textAs(await withProfiles(), 'html')).replace(/[\u00a0\u202f]/g, ' ')
    expect(html).toContain('4 rows from 1 kHz to 1 GHz')
    expect(html).toContain('3 rows from 1 kHz to 50 MHz')
  })

  it('is written in every format', async () => {
    const result = await withProfiles()
    expect(await textAs(result, 'csv')).toMatch(/P28/)
    expect(JSON.parse(await textAs(result, 'json'))).toHaveProperty('assumptions')
    expect((await bytesAs(result, 'pdf')).subarray(0, 5).toString()).toBe('%PDF-')
  })
})
