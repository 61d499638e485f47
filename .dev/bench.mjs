/** `npm run bench`: medians with what the machine is. Not a test: numbers depend on who else uses it. */
import { spawnSync } from 'node:child_process'
import { mkdtempSync, readdirSync, rmSync, statSync } from 'node:fs'
import { cpus, tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('..', import.meta.url))
const tool = `${root}dist/tapeworthy.js`

const median = (values) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]
const spread = (values, unit, digits = 0) =>
  `${median(values).toFixed(digits)} ${unit} (${Math.min(...values).toFixed(digits)} to ${Math.max(...values).toFixed(digits)}, ${values.length} runs)`

const demos = readdirSync(`${root}scenarios-demo`)
  .filter((file) => file.endsWith('.yaml'))
  .map((file) => `scenarios-demo/${file}`)
if (demos.length === 0) {
  console.error('scenarios-demo/ holds no scenario: nothing to time')
  process.exit(1)
}
/** The largest demo is the one with most checks. */
const checksOf = (file) =>
  JSON.parse(
    spawnSync(process.execPath, [tool, 'check', file, '--json'], {
      cwd: root,
      encoding: 'utf8',
      maxBuffer: 2 ** 30,
    }).stdout,
  ).cases.reduce((sum, one) => sum + one.checks.length, 0)
const largest = demos
  .map((file) => ({ file, checks: checksOf(file), size: statSync(`${root}${file}`).size }))
  .sort((a, b) => b.checks - a.checks || b.size - a.size)[0]

/** Wall time of a fresh process, and its peak memory as the process itself reports it on leaving. */
const REPORT = "process.on('exit',()=>require('node:fs').writeSync(3,String(process.resourceUsage().maxRSS)))"
function cold(args) {
  const start = performance.now()
  const done = spawnSync(
    process.execPath,
    [
      '--import',
      `data:text/javascript,import{createRequire}from'node:module';const require=createRequire('file:///x.js');${REPORT}`,
      tool,
      ...args,
    ],
    {
      cwd: root,
      stdio: ['ignore', 'ignore', 'inherit', 'pipe'],
    },
  )
  if (done.status !== 0) throw new Error(`${args.join(' ')} ended with status ${done.status}`)
  return { ms: performance.now() - start, MB: Number(done.output[3]) / 1024 }
}
const times = (count, run) => Array.from({ length: count }, run)

console.log(`${cpus().length} cores (${cpus()[0]?.model ?? 'unknown'}), Node ${process.versions.node}`)
console.log(`largest demo: ${largest.file}, ${largest.checks} checks in all`)

const checks = times(9, () => cold(['check', largest.file]))
console.log(
  `check, cold:       ${spread(
    checks.map(({ ms }) => ms),
    'ms',
  )}; wanted 700 ms at most`,
)

const out = mkdtempSync(join(tmpdir(), 'tapeworthy-bench-'))
try {
  const memos = times(5, () => cold(['memo', largest.file, '--out', out]))
  console.log(
    `memo, all formats: ${spread(
      memos.map(({ ms }) => ms),
      'ms',
    )}; wanted 2500 ms at most`,
  )
  console.log(
    `memo, peak memory: ${spread(
      memos.map(({ MB }) => MB),
      'MB',
    )}; wanted 250 MB at most`,
  )
} finally {
  rmSync(out, { recursive: true, force: true })
}

const { clockBench, pointBench } = await import(`${root}dist/bench.js`)
for (const file of demos) {
  const bench = await pointBench(file, root)
  bench.run(20_000)
  const each = times(31, () => {
    const start = performance.now()
    bench.run(1000)
    return performance.now() - start
  })
  console.log(
    `one operating point (${bench.checks} checks): ${spread(each, 'µs', 1)}, each over 1000 points; wanted 40 µs at most`,
  )
  console.log(`  ${file}: ${bench.name}`)
}

const clock = await clockBench('scenarios-demo/clock-generator.yaml', root)
clock.cases(50)
clock.draws(5000)
const timed = (run, times) =>
  Array.from({ length: 31 }, () => {
    const start = performance.now()
    run(times)
    return (performance.now() - start) / times
  })
const whole = timed(clock.cases, 25)
const draws = timed(clock.draws, 1000).map((ms) => ms * 1000)
console.log(
  `one clock case, best bandwidth at every operating point: ${spread(whole, 'ms', 2)}; wanted 3 ms at most`,
)
console.log(`one draw of a clock at a stated bandwidth: ${spread(draws, 'µs', 1)}; wanted 20 µs at most`)
console.log(
  `  a draw over a whole case: 1 : ${((median(whole) * 1000) / median(draws)).toFixed(0)}; ${clock.name}`,
)
