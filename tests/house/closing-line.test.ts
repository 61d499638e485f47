import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { ROOT } from './repository.ts'

const folder = mkdtempSync(join(tmpdir(), 'tapeworthy-closing-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

function closing(report: object | null, before = 0) {
  const file = join(folder, 'report.json')
  rmSync(file, { force: true })
  if (report !== null) writeFileSync(file, JSON.stringify(report))
  const args = [join(ROOT, '.ci/closing-line.mjs'), String(before), file]
  const { status, stdout } = spawnSync(process.execPath, args, { encoding: 'utf8' })
  return { status, lines: stdout.trimEnd().split('\n') }
}

const report = (passed: number, failed: number, testResults: readonly object[] = []) => ({
  numPassedTests: passed,
  numFailedTests: failed,
  testResults,
})

describe('closing line of a run', () => {
  it('counts what the runner counted', () => {
    expect(closing(report(12, 0))).toEqual({ status: 0, lines: ['12 passed, 0 failed'] })
  })

  it('names what failed and fails', () => {
    const assertionResults = [{ status: 'failed', fullName: 'a law does not hold' }]
    const suite = { name: '/x/tests/device/a.test.ts', status: 'failed', assertionResults }
    const { status, lines } = closing(report(11, 1, [suite]), 1)
    expect(status).toBe(1)
    expect(lines).toEqual(['failed: tests/device/a.test.ts  a law does not hold', '11 passed, 1 failed'])
  })

  it('names a file that could not be run', () => {
    const suite = {
      name: '/x/tests/a.test.ts',
      status: 'failed',
      message: 'no such module',
      assertionResults: [],
    }
    const { status, lines } = closing(report(11, 0, [suite]), 1)
    expect(status).toBe(1)
    expect(lines[0]).toContain('tests/a.test.ts  could not be run: no such module')
    expect(lines.at(-1)).toBe('11 passed, 0 failed')
  })

  it('fails when no test ran, when there is no report, and when a step before failed', () => {
    for (const nothing of [report(0, 0), null]) {
      const { status, lines } = closing(nothing)
      expect(status).toBe(1)
      expect(lines.at(-1)).toBe('0 passed, 0 failed')
    }
    expect(closing(report(12, 0), 1).status).toBe(1)
  })
})
