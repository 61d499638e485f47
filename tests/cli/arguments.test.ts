import { afterAll, describe, expect, it } from 'vitest'
import { textAt } from '../house/repository.ts'
import { openShell } from './shell.ts'

const shell = openShell()
afterAll(shell.remove)
const COMMANDS = ['memo', 'check', 'why', 'nodes', 'start', 'guide', 'schema']

describe('command line', () => {
  it('without arguments says in five lines what to do next', async () => {
    const { status, out, err } = await shell.run()
    expect(status).toBe(0)
    expect(err).toBe('')
    expect(out.trimEnd().split('\n')).toHaveLength(5)
    for (const word of ['start', 'check', 'memo', '--help']) expect(out).toContain(word)
  })

  it('prints the version of package.json', async () => {
    const { status, out } = await shell.run('--version')
    expect(status).toBe(0)
    expect(out.trim()).toBe(JSON.parse(textAt('package.json')).version)
  })

  it.each(COMMANDS)('%s --help tells what it does, an example and the exit statuses', async (name) => {
    const { status, out } = await shell.run(name, '--help')
    expect(status).toBe(0)
    expect(out).toMatch(new RegExp(`Usage: tapeworthy ${name}`))
    expect(out).toMatch(new RegExp(`Example:\\n  tapeworthy ${name}`))
    expect(out).toMatch(/Exit status:\n {2}0 .*\n {2}1 .*\n {2}2 .*\n {2}3 /)
  })

  it('--help lists exactly the commands of this version', async () => {
    const { status, out } = await shell.run('--help')
    expect(status).toBe(0)
    const listed = [...out.matchAll(/^ {2}([a-z]+)(?: \[options\])? /gm)].map(([, name]) => name)
    for (const name of COMMANDS) expect(listed).toContain(name)
    for (const later of ['reach', 'odds', 'desk', 'device', 'gather']) expect(listed).not.toContain(later)
  })

  it.each([
    ['chek', 'check'],
    ['mmeo', 'memo'],
    ['shcema', 'schema'],
  ])('an unknown command %s names the nearest, %s, and leaves with 2', async (wrong, near) => {
    const { status, out, err } = await shell.run(wrong)
    expect(status).toBe(2)
    expect(out).toBe('')
    expect(err).toContain(`'${near}'`)
  })

  it.each([
    [['check']],
    [['check', 'a.yaml', 'b.yaml']],
    [['check', 'a.yaml', '--jsno']],
    [['memo', 'a.yaml', '--as', 'html,doc']],
    [['memo', 'a.yaml', '--date', '2027-02-30']],
    [['memo', 'a.yaml', '--date', 'today']],
    [['memo', 'a.yaml', '--paper', 'a3']],
    [['start', 'bridge', 'a.yaml']],
    [['schema', 'memo']],
  ])('wrong arguments %j leave with 2 and say why', async (argv) => {
    const { status, out, err } = await shell.run(...argv)
    expect(status).toBe(2)
    expect(out).toBe('')
    expect(err.trim()).not.toBe('')
    expect(err).not.toMatch(/\n\s+at /)
  })

  it('a scenario that is not there leaves with 2 and names it', async () => {
    for (const name of ['check', 'memo']) {
      const { status, err } = await shell.run(name, 'missing.yaml')
      expect(status).toBe(2)
      expect(err).toContain('missing.yaml')
      expect(err).toContain('no such file')
    }
  })

  it('a fault of the program is one line and status 1; the stack only on request', async () => {
    for (const [debug, stack] of [
      ['0', false],
      ['1', true],
    ] as const) {
      const broken = openShell({ TAPEWORTHY_DEBUG: debug })
      const text: string[] = []
      const { run } = await import('../../src/cli/run.ts')
      const io = broken.io(
        () => {
          throw new Error('the stream broke')
        },
        (line) => text.push(line),
      )
      expect(await run(['nodes'], io)).toBe(1)
      expect(text.join('')).toContain('a fault of the program: the stream broke')
      expect(/\n\s+at /.test(text.join(''))).toBe(stack)
      broken.remove()
    }
  })
})
