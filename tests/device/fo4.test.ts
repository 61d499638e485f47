import { evaluate } from 'mathjs'
import { describe, expect, test } from 'vitest'
import { Recorder } from '../../src/derivation/recorder.ts'
import { PLAIN } from '../../src/derivation/trace.ts'
import { cornerPoint, deviceAt, typicalPoint } from '../../src/device/conditions.ts'
import { fo4At } from '../../src/device/fo4.ts'
import { givenLeaves, knownLeaves } from '../../src/verdict/leaves.ts'
import { builtInClass, CLASS_IDS } from '../nodes/built-in.ts'

const here = (id: string, corner: 'slow' | 'typical' | 'fast', T: number, V?: number): number => {
  const { values } = builtInClass(id)
  const nmos = deviceAt(values.nmos, cornerPoint(values, corner, T, 0, 0), PLAIN)
  return fo4At(values, nmos, deviceAt(values.nmos, typicalPoint(300), PLAIN), V ?? values.supply.core, PLAIN)
}

describe('FO4 away from its datum', () => {
  test.each(CLASS_IDS)('%s: the published delay at typical, 300 K, core supply (law)', (id) => {
    expect(here(id, 'typical', 300)).toBe(builtInClass(id).values.fo4)
  })

  test.each(CLASS_IDS)('%s: slow is slower, fast is faster, a lower supply is slower (law)', (id) => {
    const { values } = builtInClass(id)
    const datum = values.fo4
    expect(here(id, 'slow', 300)).toBeGreaterThan(1.05 * datum)
    expect(here(id, 'fast', 300)).toBeLessThan(0.95 * datum)
    expect(here(id, 'typical', 300, 0.9 * values.supply.core)).toBeGreaterThan(1.02 * datum)
    expect(here(id, 'typical', 300, 1.1 * values.supply.core)).toBeLessThan(0.99 * datum)
  })

  test('proportional to the datum (law)', () => {
    const { values } = builtInClass('P28')
    const [typical, slow] = [typicalPoint(300), cornerPoint(values, 'slow', 398.15, 0.05, 0.025)].map((at) =>
      deviceAt(values.nmos, at, PLAIN),
    )
    const once = fo4At(values, slow!, typical!, 0.9, PLAIN)
    expect(fo4At({ ...values, fo4: 2 * values.fo4 }, slow!, typical!, 0.9, PLAIN)).toBe(2 * once)
  })

  test('far below the threshold the delay grows as V over the exponential of V/(2 n U_T) (law)', () => {
    // V_GS = V drives harder than V_GS = V/2 by an exponential factor, so I_eff → J(V)/2 there.
    const { values } = builtInClass('P28')
    const { U_T } = deviceAt(values.nmos, typicalPoint(300), PLAIN)
    const ratio = here('P28', 'typical', 300, 0.12) / here('P28', 'typical', 300, 0.14)
    const drive = (V: number): number =>
      Math.exp(V / (values.nmos.n * U_T)) + Math.exp(V / (2 * values.nmos.n * U_T))
    expect(Math.abs(ratio / ((0.12 / drive(0.12)) * (drive(0.14) / 0.14)) - 1)).toBeLessThan(2e-3)
  })

  test('recorded steps give the same bits and evaluate to their values (law)', () => {
    const node = builtInClass('F16')
    const at = cornerPoint(node.values, 'slow', 233.15, 0.05, 0.025)
    const t = new Recorder(knownLeaves(givenLeaves([], node.provenance), at))
    const nmos = deviceAt(node.values.nmos, at, t)
    const delay = fo4At(node.values, nmos, deviceAt(node.values.nmos, typicalPoint(300), t), 0.8, t)
    const plain = deviceAt(node.values.nmos, at, PLAIN)
    const typical = deviceAt(node.values.nmos, typicalPoint(300), PLAIN)
    expect(delay).toBe(fo4At(node.values, plain, typical, 0.8, PLAIN))
    const steps = t.steps(null, delay, null)
    const formulas = steps.filter(({ kind }) => kind === 'formula')
    expect(formulas.length).toBeGreaterThan(12)
    for (const { formula, inputs, value, symbol } of formulas) {
      expect(Math.abs(evaluate(formula, { ...inputs }) / value - 1), symbol).toBeLessThan(1e-9)
    }
  })
})
