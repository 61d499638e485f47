import { describe, expect, it } from 'vitest'
import { readNode, resolveNodes } from '../../src/nodes/read.ts'
import { accessTo } from '../scenario/scenarios.ts'

const OWN = `format: 1
id: OWN
label: Ours
based_on: P28
nmos:
  C_lay: {value: 0.58 fF/µm, source: extraction of the standard pair, low: 0.5 fF/um, high: 0.7 fF/um}
  V_T0: {value: 360 mV, source: invented for this test, evidence: invented}
`

function node(text: string, files: Readonly<Record<string, string>> = {}, file = 'own.yaml') {
  const read = readNode(text, file, accessTo(files))
  if (!read.ok) throw new Error(JSON.stringify(read.faults))
  return read.value
}
const codes = (text: string, files: Readonly<Record<string, string>> = {}) => {
  const read = readNode(text, 'own.yaml', accessTo(files))
  return read.ok ? [] : read.faults.map(({ code }) => code)
}

describe('a node file', () => {
  it('its own values win over those it is based on, in SI', () => {
    const { id, label, values } = node(OWN)
    const below = node(accessTo().builtIn('P28')!).values
    expect([id, label]).toEqual(['OWN', 'Ours'])
    expect(values.nmos.C_lay).toBe(0.58e-9)
    expect(values.nmos.V_T0).toBe(0.36)
    expect(values.nmos.L).toBe(below.nmos.L)
    expect(values.pmos).toEqual(below.pmos)
  })

  it('every value keeps its own source, evidence and spread', () => {
    const { provenance } = node(OWN)
    const at = (path: string) => provenance.find((one) => one.path === path)
    expect(at('nmos.C_lay')).toMatchObject({
      source: 'extraction of the standard pair',
      evidence: 'given',
      origin: 'node',
      unit: 'F/m',
      spread: { low: 0.5e-9, typical: 0.58e-9, high: 0.7e-9 },
    })
    expect(at('nmos.V_T0')).toMatchObject({ evidence: 'invented' })
    expect(at('nmos.V_T0')).not.toHaveProperty('spread')
    expect(at('fo4')).toMatchObject({ evidence: 'published', origin: 'node' })
    expect(at('shares.m')?.source).not.toBe('')
  })

  it('one end of a spread may be stated alone', () => {
    const text = OWN.replace(', low: 0.5 fF/um', '')
    expect(node(text).provenance.find(({ path }) => path === 'nmos.C_lay')?.spread).toEqual({
      low: 0.58e-9,
      typical: 0.58e-9,
      high: 0.7e-9,
    })
  })

  it('a chain of files ends at a class; each path is relative to the file that names it', () => {
    const files = {
      'deep/b.yaml': 'based_on: ../deep/c.yaml\nfo4: {value: 12 ps, source: b}\n',
      'deep/c.yaml': 'based_on: P28\nfo4: {value: 14 ps, source: c}\ninductor_q: {value: 15, source: c}\n',
    }
    const { values } = node(OWN.replace('P28', 'deep/b.yaml'), files)
    expect([values.fo4, values.inductor_q, values.nmos.C_lay]).toEqual([12e-12, 15, 0.58e-9])
  })

  it('never passes for the one it is based on', () => {
    expect(codes('format: 1\nbased_on: P28\n')).toEqual(['key.missing', 'key.missing'])
  })

  it('reads JSON, and tells every value that is missing when it stands alone', () => {
    expect(codes(JSON.stringify({ format: 1, id: 'J', label: 'J', based_on: 'P28' }))).toEqual([])
    const missing = codes('format: 1\nid: A\nlabel: A\nclass: 28 nm\nkind: planar\n')
    expect(new Set(missing)).toEqual(new Set(['key.missing']))
    expect(missing.length).toBeGreaterThan(30)
  })
})

describe('the nodes of a scenario', () => {
  it('come in the order named, with every file that was read', () => {
    const read = resolveNodes(['F16', 'n/own.yaml', 'P28'], 'a.yaml', accessTo({ 'n/own.yaml': OWN }))
    if (!read.ok) throw new Error(JSON.stringify(read.faults))
    expect(read.value.nodes.map(({ id }) => id)).toEqual(['F16', 'OWN', 'P28'])
    expect(read.value.files.map(({ file }) => file)).toContain('n/own.yaml')
  })

  it('two files with the same id are one node too many', () => {
    const read = resolveNodes(['b.yaml', 'c.yaml'], 'a.yaml', accessTo({ 'b.yaml': OWN, 'c.yaml': OWN }))
    expect(read.ok ? [] : read.faults).toMatchObject([{ code: 'node.duplicate', found: 'c.yaml' }])
  })
})
