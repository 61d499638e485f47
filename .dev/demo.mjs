/** `npm run demo`: a memo of every demo scenario in every format, with the answer sentence of each. */
import { spawnSync } from 'node:child_process'
import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('..', import.meta.url))
const scenarios = readdirSync(`${root}scenarios-demo`)
  .filter((file) => file.endsWith('.yaml'))
  .sort()

function demo(file) {
  const stem = file.replace(/\.yaml$/, '')
  const args = [`${root}dist/tapeworthy.js`, 'memo', `scenarios-demo/${file}`, '--out', 'out/demo']
  const done = spawnSync(process.execPath, args, { cwd: root, encoding: 'utf8' })
  console.log(`\n${file}`)
  if (done.status !== 0) {
    console.log(`  FAILED with status ${done.status}\n${done.stderr}`)
    return false
  }
  for (const ending of ['html', 'pdf', 'json', 'csv', 'assumptions.csv'])
    console.log(`  out/demo/${stem}.${ending}`)
  console.log(`  ${JSON.parse(readFileSync(`${root}out/demo/${stem}.json`, 'utf8')).answer.sentence}`)
  return true
}

if (scenarios.length === 0) console.error('scenarios-demo/ holds no scenario')
const made = scenarios.map(demo)
process.exit(scenarios.length > 0 && made.every(Boolean) ? 0 : 1)
