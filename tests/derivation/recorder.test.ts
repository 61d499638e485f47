import { describe, expect, test } from 'vitest'
import { formula } from '../../src/derivation/formula.ts'
import { DerivationGap, KnownLeaves, Recorder } from '../../src/derivation/recorder.ts'
import { PLAIN, type Trace } from '../../src/derivation/trace.ts'

const about = (symbol: string) => ({ symbol, meaning: symbol, unit: '1', source: 'this test' })
const sum = formula(about('s'), (a: number, b: number) => a + b)
const product = formula(about('p'), (s: number, c: number) => s * c)
const ratio = formula(about('margin'), (available: number, required: number) => available / required)
const leaf = (symbol: string, value: number) => ({ ...about(symbol), value })

function chain(t: Trace, a: number, b: number, c: number) {
  const s = t.calc(sum, a, b)
  const unused = t.calc(product, s, s)
  const p = t.calc(product, s, c)
  return { s, unused, p, margin: t.calc(ratio, p, s) }
}

describe('a recorded derivation', () => {
  const known = [leaf('a', 0.1), leaf('b', 0.2), leaf('c', 7)]

  test('has the bits of the plain run', () => {
    expect(chain(new Recorder(new KnownLeaves(known)), 0.1, 0.2, 7)).toEqual(chain(PLAIN, 0.1, 0.2, 7))
  })

  test('links every input to the step it came from and drops what the result does not rest on', () => {
    const recorder = new Recorder(new KnownLeaves(known))
    const { s, p, margin } = chain(recorder, 0.1, 0.2, 7)
    const steps = recorder.steps(s, p, margin)
    expect(steps.map(({ symbol }) => symbol)).toEqual(['a', 'b', 'c', 's', 'p', 'margin'])
    expect(steps.slice(-3).map(({ yields }) => yields)).toEqual(['required', 'available', 'margin'])
    for (const step of steps) {
      for (const [name, value] of Object.entries(step.inputs)) {
        const source = steps.find(({ id }) => id === step.from[name])
        expect(source?.value).toBe(value)
        expect(steps.indexOf(source!)).toBeLessThan(steps.indexOf(step))
      }
    }
  })

  test('prefers the given value of the same symbol when two have the same value', () => {
    const recorder = new Recorder(new KnownLeaves([leaf('x', 2), leaf('b', 2), leaf('a', 1)]))
    const s = recorder.calc(sum, 1, 2)
    const steps = recorder.steps(s, null, null)
    expect(steps.map(({ symbol }) => symbol)).toEqual(['a', 'b', 's'])
  })

  test('refuses a number that comes from nowhere', () => {
    expect(() => new Recorder(new KnownLeaves(known)).calc(sum, 0.1, 0.25)).toThrow(DerivationGap)
  })

  test('writes the same step down once', () => {
    const recorder = new Recorder(new KnownLeaves(known))
    const s = recorder.calc(sum, 0.1, 0.2)
    recorder.calc(sum, 0.1, 0.2)
    const p = recorder.calc(product, s, 7)
    expect(recorder.steps(p, null, null).filter(({ symbol }) => symbol === 's')).toHaveLength(1)
  })

  test('keeps further values that are to be shown', () => {
    const recorder = new Recorder(new KnownLeaves(known))
    const { s, p, margin, unused } = chain(recorder, 0.1, 0.2, 7)
    expect(recorder.steps(s, p, margin, [unused]).map(({ value }) => value)).toContain(unused)
  })
})
