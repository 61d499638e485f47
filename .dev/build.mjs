/**
 * Builds dist/: the command line as one file with lazy chunks, the built-in node classes, and (with --bench) the entry that
 * the benches time. Nothing is minified: the text of every formula is read from the function that runs, so
 * names of parameters and the power operator must survive. The build ends by proving that they did.
 */
import {
  chmodSync,
  cpSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs'
import { fileURLToPath } from 'node:url'
import { rolldown } from 'rolldown'

const root = fileURLToPath(new URL('..', import.meta.url))
const at = (path) => `${root}${path}`
const { name } = JSON.parse(readFileSync(at('package.json'), 'utf8'))

/** Built aside and put in place when all of it is there: a failed build leaves the last good one. */
const MADE = 'out/dist-in-the-making'

/** Heavy or rarely used: left outside the bundle and loaded when a command needs them. */
const OUTSIDE = [/^node:/, /^pdfkit/, /^mathjs/, /^handlebars/, /^dejavu-fonts-ttf/, /^d3-/]

/** Bundles one entry into dist/ under a name, with its lazy parts in a folder of its own. */
async function bundle(entry, file, chunks, banner) {
  const made = await rolldown({
    input: at(entry),
    platform: 'node',
    external: OUTSIDE,
    treeshake: true,
    transform: { target: 'node20' },
    onLog(level, log) {
      if (level === 'warn') console.warn(`build: ${log.message}`)
    },
  })
  await made.write({
    dir: at(MADE),
    format: 'esm',
    minify: false,
    entryFileNames: file,
    chunkFileNames: `${chunks}/[name].js`,
    banner,
  })
  await made.close()
}

/** A probe formula goes through the same bundler: its source must come out as it went in. */
async function proveFormulasSurvive() {
  const probe = 'export const probe = (q_s, lambda) => (2 * q_s) ** 2 + 4 * lambda * Math.sqrt(q_s)'
  const made = await rolldown({
    input: 'probe',
    platform: 'node',
    transform: { target: 'node20' },
    plugins: [{ name: 'probe', resolveId: (id) => (id === 'probe' ? id : null), load: () => probe }],
  })
  const { output } = await made.generate({ format: 'esm', minify: false })
  await made.close()
  if (!output[0].code.includes('(q_s, lambda) => (2 * q_s) ** 2 + 4 * lambda * Math.sqrt(q_s)')) {
    throw new Error('the bundler rewrites formulas: their text would no longer be readable')
  }
}

/** Licences of what is bundled travel with it. */
function copyLicences() {
  const texts = ['commander', 'yaml', 'fastest-levenshtein'].map((one) => {
    const folder = at(`node_modules/${one}`)
    const file = readdirSync(folder).find((found) => /^licen[cs]e/i.test(found))
    if (file === undefined) throw new Error(`${one} ships no licence text`)
    return `${one}\n\n${readFileSync(`${folder}/${file}`, 'utf8').trim()}\n`
  })
  writeFileSync(at(`${MADE}/LICENCES-BUNDLED.txt`), texts.join(`\n${'-'.repeat(72)}\n\n`))
}

/** `npx tapeworthy` in a clone finds the built tool here, without asking a registry. */
function linkCommand() {
  const link = at(`node_modules/.bin/${name}`)
  if (process.platform === 'win32' || !existsSync(at('node_modules/.bin'))) return
  rmSync(link, { force: true })
  symlinkSync('../../dist/tapeworthy.js', link)
}

await proveFormulasSurvive()
rmSync(at(MADE), { recursive: true, force: true })
mkdirSync(at(MADE), { recursive: true })
await bundle('src/cli/main.ts', 'tapeworthy.js', 'parts', '#!/usr/bin/env node')
if (process.argv.includes('--bench')) await bundle('.dev/bench-point.ts', 'bench.js', 'bench-parts', '')
chmodSync(at(`${MADE}/tapeworthy.js`), 0o755)
const classes = at('src/nodes/classes')
if (existsSync(classes))
  cpSync(classes, at(`${MADE}/classes`), { recursive: true, filter: (path) => !path.endsWith('.ts') })
copyLicences()
rmSync(at('dist'), { recursive: true, force: true })
renameSync(at(MADE), at('dist'))
linkCommand()
