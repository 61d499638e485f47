import { describe, expect, it } from 'vitest'
import { textAt } from './repository.ts'

interface Locked {
  readonly resolved?: string
  readonly hasInstallScript?: boolean
  readonly dev?: boolean
  readonly integrity?: string
  readonly license?: string
  readonly dependencies?: Readonly<Record<string, string>>
  readonly optionalDependencies?: Readonly<Record<string, string>>
}

const lock = JSON.parse(textAt('package-lock.json')) as { packages: Readonly<Record<string, Locked>> }
const manifest = JSON.parse(textAt('package.json')) as {
  dependencies: Readonly<Record<string, string>>
  scripts: Readonly<Record<string, string>>
  engines: { node: string }
}
const packages = Object.entries(lock.packages).filter(([place]) => place !== '')

/** Whether a package is locked in some node_modules folder from a place upwards, as Node looks for it. */
function found(place: string, name: string): boolean {
  for (let from = place; ; from = from.slice(0, Math.max(0, from.lastIndexOf('/node_modules/')))) {
    if (lock.packages[`${from === '' ? '' : `${from}/`}node_modules/${name}`] !== undefined) return true
    if (from === '') return false
  }
}

describe('dependencies', () => {
  it('the lock file names no address, and a checksum for every package', () => {
    expect(packages.filter(([, one]) => one.resolved !== undefined).map(([place]) => place)).toEqual([])
    expect(packages.filter(([, one]) => one.integrity === undefined).map(([place]) => place)).toEqual([])
  })

  it('the lock file holds every package that another asks for, or a clean install stops', () => {
    const missing = packages.flatMap(([place, one]) =>
      Object.keys({ ...one.dependencies, ...one.optionalDependencies })
        .filter((name) => !found(place, name))
        .map((name) => `${place} asks for ${name}`),
    )
    expect(missing).toEqual([])
  })

  it('nothing runs when the package is installed', () => {
    const running = packages.filter(([, one]) => one.hasInstallScript === true && one.dev !== true)
    expect(running.map(([place]) => place)).toEqual([])
    for (const script of ['preinstall', 'install', 'postinstall', 'prepare']) {
      expect(manifest.scripts).not.toHaveProperty(script)
    }
  })

  it('every dependency is explained in DEVELOPERS.md', () => {
    const told = textAt('DEVELOPERS.md')
    expect(Object.keys(manifest.dependencies).filter((name) => !told.includes(`\`${name}\``))).toEqual([])
  })

  it('Node 20 is the least', () => {
    expect(manifest.engines.node).toBe('>=20')
  })
})
