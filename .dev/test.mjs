/**
 * `npm test`: types, lint and format, build, then the tests, each timed; one summary at the end. All steps run
 * even when one fails, so that one run shows everything. Extra arguments go to the test runner.
 */
import { spawnSync } from 'node:child_process'
import { mkdirSync, readFileSync, rmSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('..', import.meta.url))
const report = `${root}out/tests.json`
mkdirSync(`${root}out`, { recursive: true })
rmSync(report, { force: true })

const tool = (path) => [process.execPath, `${root}node_modules/${path}`]
const steps = [
  ['types', ...tool('typescript/bin/tsc'), '--noEmit', '-p', `${root}.dev`],
  ['lint and format', ...tool('@biomejs/biome/bin/biome'), 'check', '--error-on-warnings', '.'],
  ['build', process.execPath, `${root}.dev/build.mjs`],
  [
    'tests',
    ...tool('vitest/vitest.mjs'),
    'run',
    '--config',
    `${root}.dev/vitest.config.ts`,
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report}`,
    ...process.argv.slice(2),
  ],
]

/** What the runner's own report says; null when it wrote none. */
function counted() {
  try {
    const { numPassedTests, numFailedTests, numFailedTestSuites } = JSON.parse(readFileSync(report, 'utf8'))
    return { passed: numPassedTests, failed: numFailedTests, suites: numFailedTestSuites }
  } catch {
    return null
  }
}

const results = steps.map(([name, command, ...args]) => {
  console.log(`\n== ${name}`)
  const start = performance.now()
  const { status } = spawnSync(command, args, { cwd: root, stdio: 'inherit' })
  return { name, ok: status === 0, seconds: (performance.now() - start) / 1000 }
})

const count = counted()
const ran = count !== null && count.passed + count.failed > 0
console.log('\n== summary')
for (const { name, ok, seconds } of results) {
  console.log(`${ok ? 'ok    ' : 'FAILED'}  ${name.padEnd(16)} ${seconds.toFixed(1)} s`)
}
console.log(ran ? `${count.passed} tests passed, ${count.failed} failed` : 'no test ran: counts as failed')
process.exit(ran && results.every(({ ok }) => ok) ? 0 : 1)
