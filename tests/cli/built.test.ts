import { spawnSync } from 'node:child_process'
import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { ROOT, textAt } from '../house/repository.ts'

const TOOL = join(ROOT, 'dist/tapeworthy.js')
const DEMO = 'scenarios-demo/low-cost-lane.yaml'

function shell(command: string) {
  return spawnSync('bash', ['-c', command], {
    cwd: ROOT,
    encoding: 'utf8',
    maxBuffer: 2 ** 28,
    env: { ...process.env, NODE: process.execPath, TOOL },
  })
}

// `npm test` builds first, and fails when the build fails; a single file of tests may be run without a build.
describe.skipIf(!existsSync(TOOL))('the built tool', () => {
  it('starts as a command and knows its version', () => {
    expect(readFileSync(TOOL, 'utf8')).toMatch(/^#!\/usr\/bin\/env node\n/)
    const { status, stdout } = spawnSync(TOOL, ['--version'], { encoding: 'utf8' })
    expect(status).toBe(0)
    expect(stdout.trim()).toBe(JSON.parse(textAt('package.json')).version)
  })

  it('ends quietly when its reader has seen enough', () => {
    const { stdout, stderr } = shell(
      `"$NODE" "$TOOL" check ${DEMO} --json | head -c 1; echo " \${PIPESTATUS[0]}"`,
    )
    expect(stderr).toBe('')
    expect(stdout).toBe('{ 0\n')
  })

  it('passes a long result whole through a pipe', () => {
    const { stdout } = shell(`"$NODE" "$TOOL" check ${DEMO} --json | cat`)
    expect(stdout.length).toBeGreaterThan(100_000)
    expect(() => JSON.parse(stdout)).not.toThrow()
  })

  it('hands its exit status to the shell', () => {
    expect(shell('"$NODE" "$TOOL" check none.yaml').status).toBe(2)
    expect(shell(`"$NODE" "$TOOL" check ${DEMO} --must-pass P180`).status).toBe(3)
  })

  it('shows formulas as they are written: names kept, powers kept, no bare decimal point', () => {
    const result = JSON.parse(shell(`"$NODE" "$TOOL" check ${DEMO} --json`).stdout)
    const formulas: string[] = result.cases.flatMap(
      (one: { checks: { steps: { kind: string; formula: string }[] }[] }) =>
        one.checks.flatMap(({ steps }) =>
          steps.filter(({ kind }) => kind === 'formula').map(({ formula }) => formula),
        ),
    )
    expect(formulas).toContain('k_B * T / q_e')
    expect(formulas.some((formula) => formula.includes('^'))).toBe(true)
    expect(formulas.filter((formula) => /\*\*|Math|(?<![\w.])\.\d/.test(formula))).toEqual([])
  })
})
