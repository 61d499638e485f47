import { execFileSync } from 'node:child_process'
import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { machineFiles } from '../../src/cli/files.ts'
import { FileFault } from '../../src/cli/io.ts'

let folder = ''
const files = machineFiles()
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'tapeworthy-files-'))
})
afterEach(() => rmSync(folder, { recursive: true, force: true }))
const at = (name: string): string => join(folder, name)
const whyNot = (act: () => unknown): string => {
  try {
    act()
  } catch (error) {
    if (error instanceof FileFault) return error.why
    throw error
  }
  return 'it worked'
}

describe('writing', () => {
  it('makes the folder, writes text and bytes, and leaves nothing else behind', () => {
    files.writeAll([
      { file: at('deep/a.txt'), content: 'Ω ≥ √2' },
      { file: at('deep/b.bin'), content: [new Uint8Array([0, 255]), new Uint8Array([10])] },
    ])
    expect(readFileSync(at('deep/a.txt'), 'utf8')).toBe('Ω ≥ √2')
    expect([...readFileSync(at('deep/b.bin'))]).toEqual([0, 255, 10])
    expect(readdirSync(at('deep')).sort()).toEqual(['a.txt', 'b.bin'])
  })

  it('writes none when one cannot be written, and removes the temporary files', () => {
    writeFileSync(at('old.txt'), 'as it was')
    mkdirSync(at('taken'))
    const why = whyNot(() =>
      files.writeAll([
        { file: at('old.txt'), content: 'new' },
        { file: at('taken'), content: 'a folder stands here' },
      ]),
    )
    expect(why).toContain('folder')
    expect(readFileSync(at('old.txt'), 'utf8')).toBe('as it was')
    expect(readdirSync(folder).sort()).toEqual(['old.txt', 'taken'])
  })

  it('follows a link to the file it names instead of replacing the link', () => {
    writeFileSync(at('real.txt'), 'old')
    symlinkSync('real.txt', at('link.txt'))
    files.writeAll([{ file: at('link.txt'), content: 'new' }])
    expect(readFileSync(at('real.txt'), 'utf8')).toBe('new')
  })

  it('says why when a part of the path is a file', () => {
    writeFileSync(at('file'), '')
    expect(whyNot(() => files.writeAll([{ file: at('file/a.txt'), content: '' }]))).toContain('file')
    expect(existsSync(at('file/a.txt'))).toBe(false)
  })
})

describe('reading', () => {
  it('refuses what is missing, a folder, too large, a device or not UTF-8', () => {
    expect(whyNot(() => files.readText(at('none')))).toContain('no such file')
    expect(whyNot(() => files.readText(folder))).toContain('folder')
    writeFileSync(at('latin'), new Uint8Array([0x67, 0xfc, 0x74]))
    expect(whyNot(() => files.readText(at('latin')))).toContain('UTF-8')
    writeFileSync(at('large'), new Uint8Array(17 * 2 ** 20))
    expect(whyNot(() => files.readText(at('large')))).toContain('16 MiB')
    expect(whyNot(() => files.readText('/dev/zero'))).toContain('plain file')
  })

  it('reads what another program wrote', () => {
    execFileSync('sh', ['-c', `printf 'a: 1 # \\303\\251\\n' > ${at('sh.yaml')}`])
    chmodSync(at('sh.yaml'), 0o444)
    expect(files.readText(at('sh.yaml'))).toBe('a: 1 # é\n')
  })
})
