/**
 * Closes a run: names what failed, then prints `N passed, N failed` from the runner's own report. Fails when
 * anything failed, when the step before failed, or when no test ran.
 */
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

const status = Number(process.argv[2] ?? 0)
const file = process.argv[3] ?? fileURLToPath(new URL('../out/tests.json', import.meta.url))

function read() {
  try {
    return JSON.parse(readFileSync(file, 'utf8'))
  } catch {
    return { numPassedTests: 0, numFailedTests: 0, testResults: [] }
  }
}

const { numPassedTests: passed, numFailedTests: failed, testResults } = read()
const place = (name) => name.replace(/^.*\/tests\//, 'tests/')
for (const suite of testResults.filter(({ status }) => status === 'failed')) {
  const tests = suite.assertionResults.filter(({ status }) => status === 'failed')
  for (const { fullName } of tests) console.log(`failed: ${place(suite.name)}  ${fullName}`)
  if (tests.length === 0) console.log(`failed: ${place(suite.name)}  could not be run: ${suite.message}`)
}
if (passed + failed === 0) console.log('no test ran')
if (status !== 0 && failed === 0)
  console.log(`a step of npm test failed (status ${status}), see the summary above`)
console.log(`${passed} passed, ${failed} failed`)
process.exitCode = status !== 0 || failed > 0 || passed === 0 ? 1 : 0
