import { expect, it } from 'vitest'
import { readNode } from '../../src/nodes/read.ts'
import type { Fault } from '../../src/scenario/fault.ts'
import { FAULT_CODES } from '../../src/scenario/fault-codes.ts'
import { readScenario } from '../../src/scenario/read.ts'
import { accessTo, demo } from './scenarios.ts'

/** Numbers that look random and are the same in every run (a linear congruence modulo 2^32). */
function dice(seed: number): (sides: number) => number {
  let state = seed
  return (sides) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return Math.floor((state / 2 ** 32) * sides)
  }
}

const PIECES = [
  ...'{}[]:,-#&*!|>%@`"\'\t\n\r\\ 0',
  '\u0000',
  '\uFEFF',
  '\u2028',
  '\ud800',
  '---\n',
  '...\n',
  '*a',
  '&a ',
  '<<: *a',
  '? ',
  '!!binary ',
  '!!set ',
  '__proto__: ',
  'toString',
  '.nan',
  '-.inf',
  '1e999',
  '-1',
  '0',
  'null',
  '112 GB/s',
  '99999999999999999999',
  '{low: 1, typical: 0, high: 2}',
  '[[[[',
  '%YAML 1.1\n---\n',
  '√²·×',
]

function mutated(text: string, roll: (sides: number) => number): string {
  let result = text
  for (let times = 1 + roll(4); times > 0; times--) {
    const at = roll(result.length + 1)
    const length = roll(12)
    const piece = PIECES[roll(PIECES.length)]!
    const lines = result.split('\n')
    result = [
      () => result.slice(0, at) + result.slice(at + length),
      () => result.slice(0, at) + piece + result.slice(at),
      () => result.slice(0, at) + piece + result.slice(at + length),
      () => result.slice(0, at),
      () => lines.toSpliced(roll(lines.length), 0, lines[roll(lines.length)]!).join('\n'),
      () => lines.toSpliced(roll(lines.length), 1).join('\n'),
    ][roll(6)]!()
  }
  return result
}

function expectTold(faults: readonly Fault[], text: string): void {
  expect(faults.length).toBeGreaterThan(0)
  const lines = text.split('\n').length
  for (const { code, line, column, found, allowed, remedy } of faults) {
    expect(Object.keys(FAULT_CODES)).toContain(code)
    expect(line).toBeGreaterThanOrEqual(1)
    expect(line).toBeLessThanOrEqual(lines + 1)
    expect(column).toBeGreaterThanOrEqual(1)
    for (const said of [found, allowed, remedy]) {
      expect(said.trim()).not.toBe('')
      expect(said).not.toMatch(/undefined|\[object|NaN|\bat .*\.ts/)
    }
  }
}

/** Paths of numbers that are infinite or not a number, anywhere inside. */
function notFinite(value: unknown, path = ''): readonly string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [path]
  if (value === null || typeof value !== 'object') return []
  return Object.entries(value).flatMap(([name, inner]) => notFinite(inner, `${path}.${name}`))
}

it('law: a damaged scenario is read or its faults are told; nothing is thrown or takes long', async () => {
  const roll = dice(20270301)
  const demos = ['lane-56', 'clock-generator', 'lane-224', 'low-cost-lane'].map(demo)
  let [refused, longest] = [0, 0]
  for (let k = 0; k < 2000; k++) {
    const text = mutated(demos[k % demos.length]!, roll)
    const start = performance.now()
    const read = await readScenario(text, 'a.yaml', accessTo())
    longest = Math.max(longest, performance.now() - start)
    if (read.ok) expect(notFinite(read.value)).toEqual([])
    else {
      refused++
      expectTold(read.faults, text)
    }
  }
  expect(refused).toBeGreaterThan(1000)
  expect(refused).toBeLessThan(1950)
  expect(longest).toBeLessThan(2000)
})

it('law: a damaged node file is read or its faults are told; nothing is thrown', () => {
  const roll = dice(7)
  const whole = accessTo().builtIn('P28')!
  let refused = 0
  for (let k = 0; k < 150; k++) {
    const text = mutated(whole, roll)
    const read = readNode(text, 'n.yaml', accessTo())
    if (read.ok) expect(notFinite(read.value)).toEqual([])
    else {
      refused++
      expectTold(read.faults, text)
    }
  }
  expect(refused).toBeGreaterThan(60)
  expect(refused).toBeLessThan(149)
})
