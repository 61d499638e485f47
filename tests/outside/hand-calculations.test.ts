import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { clockBuffers } from '../../src/blocks/clock-buffers.ts'
import { lcOscillator } from '../../src/blocks/lc-oscillator.ts'
import type { AnySubBlock } from '../../src/blocks/sub-block.ts'
import { typicalPoint } from '../../src/device/conditions.ts'
import { caseOf, walked } from '../blocks/bench.ts'
import { builtInClass } from '../nodes/built-in.ts'

/**
 * The guide's hand calculations. *Independent*: the fixture was made from the published formulas by a script that
 * reads nothing of the planner (tests/outside/makers/hand_calculations.py, SciPy 1.17.1).
 */
const fixture = JSON.parse(
  readFileSync(new URL('fixtures/hand-calculations.json', import.meta.url), 'utf8'),
) as Record<'buffer' | 'oscillator', Record<string, number>>
const chapter = readFileSync(new URL('../../templates/guide/hand-calculations.hbs', import.meta.url), 'utf8')

const given = caseOf(builtInClass('P28').values, {
  clock: { coupling: 'dc' },
  oscillator: { kind: 'LC', range: [13e9, 15e9] },
  demand: { route: 'derived' },
})
const at = typicalPoint(300.15)

/** Values of the planner's own steps by symbol; a symbol that occurs more than once keeps them all. */
function stepsOf(block: AnySubBlock, check: string): ReadonlyMap<string, readonly number[]> {
  const found = new Map<string, number[]>()
  for (const { symbol, value } of walked(given, block, check, at)) {
    found.set(symbol, [...(found.get(symbol) ?? []), value])
  }
  return found
}

const close = (values: readonly number[], expected: number): boolean =>
  values.some((value) => Math.abs(value / expected - 1) < 1e-8)

const speed = stepsOf(clockBuffers, 'speed')
const headroom = stepsOf(clockBuffers, 'headroom')
const oscillator = stepsOf(lcOscillator, 'speed')
const STEP: Readonly<Record<string, readonly [ReadonlyMap<string, readonly number[]>, string]>> = {
  V_T: [headroom, 'V_T'],
  V_tail: [headroom, 'V_tail'],
  J_req: [headroom, 'J'],
  V_need: [headroom, 'V_need'],
  headroom_margin: [headroom, 'margin'],
}

describe('independent: the planner repeats the hand calculation of a clock buffer', () => {
  test.each(Object.entries(fixture.buffer))('%s = %s', (name, expected) => {
    const [steps, symbol] = STEP[name] ?? [speed, name]
    expect(close(steps.get(symbol) ?? [], expected), `${symbol}: ${steps.get(symbol)}`).toBe(true)
  })
})

describe('independent: the planner repeats the hand calculation of an LC oscillator', () => {
  test.each(Object.entries(fixture.oscillator))('%s = %s', (name, expected) => {
    expect(close(oscillator.get(name) ?? [], expected), `${name}: ${oscillator.get(name)}`).toBe(true)
  })
})

test('the chapter of the guide prints these numbers, to the digits it shows', () => {
  const printed = [...chapter.matchAll(/<data value="(\w+)\.(\w+)" data-scale="([^"]+)">([^<]+)<\/data>/g)]
  expect(printed).toHaveLength(Object.keys(fixture.buffer).length + Object.keys(fixture.oscillator).length)
  for (const [, part, name, scale, text] of printed) {
    const expected = fixture[part as 'buffer' | 'oscillator'][name!]! * Number(scale)
    expect(Math.abs(Number(text) / expected - 1), `${part}.${name}`).toBeLessThan(6e-4)
  }
})
