import { describe, expect, it } from 'vitest'
import { bodeFano, extensionFactor, padBandwidth, returnLoss } from '../../src/blocks/pad-network.ts'
import { receivePad, transmitPad } from '../../src/blocks/pads.ts'
import type { AnySubBlock } from '../../src/blocks/sub-block.ts'
import { PLAIN } from '../../src/derivation/trace.ts'
import { caseOf, type Overrides, outcomeOf, resultsOf, walkAll } from './bench.ts'

const PADS: readonly (readonly [string, AnySubBlock])[] = [
  ['transmit', transmitPad],
  ['receive', receivePad],
]
const margin = (block: AnySubBlock, over: Overrides = {}, name = 'bandwidth') =>
  outcomeOf(caseOf(28, over), block, name).margin!
const RL = { return_loss: { at_least: 8, at: 14e9 } }

/** Magnitude of the transfer of a doubly terminated ladder C-L-C… of equal R, solved with complex numbers here. */
function ladder(elements: readonly number[], w: number): number {
  // Currents and voltages backwards from a load of 1 Ω: odd elements shunt capacitors, even ones series inductors.
  let [vr, vi, ir, ii] = [1, 0, 1, 0]
  elements.forEach((g, k) => {
    if (k % 2 === 0) [ir, ii] = [ir - w * g * vi, ii + w * g * vr]
    else [vr, vi] = [vr - w * g * ii, vi + w * g * ir]
  })
  return 2 / Math.hypot(vr + ir, vi + ii)
}

describe('the terminated pad', () => {
  // values.json A23: 50 Ω at both ends.
  it.each([
    [5e-14, 127.324e9],
    [1e-13, 63.662e9],
    [1.5e-13, 42.4413e9],
    [2e-13, 31.831e9],
  ])('published: bandwidth with %s F as A23 states', (C, f) => {
    expect(Math.abs(padBandwidth.run(1, 50, C) / f - 1)).toBeLessThan(1e-4)
  })

  // values.json A24: 100 fF on 50 Ω; tolerance 1e-3 dB.
  it.each([
    [12.890625e9, 14.0466],
    [13.28125e9, 13.7978],
    [26.5625e9, 8.28924],
    [53.125e9, 3.86682],
    [21.2207e9, 10],
  ])('published: return loss at %s Hz as A24 states', (f, loss) => {
    expect(Math.abs(returnLoss.run(50, 50, f, 1e-13) - loss)).toBeLessThan(1e-3)
  })

  // values.json A25: Bode 1945, Fano 1950; 50 Ω, 100 fF.
  it.each([
    [26.5625e9, 32.6998],
    [53.125e9, 16.3499],
  ])('published: the limit up to %s Hz as A25 states', (B, limit) => {
    expect(Math.abs(bodeFano.run(B, 50, 1e-13) / limit - 1)).toBeLessThan(1e-3)
  })

  // values.json A13: Butterworth T-coil 2.82843 over 1/(RC), so half of it over the doubly terminated pole.
  it('published: a T-coil widens the pole as A13 states, never more', () => {
    expect(extensionFactor('T-coil', PLAIN)).toBeLessThanOrEqual(2.82843 / 2)
    expect(Math.abs(extensionFactor('T-coil', PLAIN) / (2.82843 / 2) - 1)).toBeLessThan(5e-3)
  })

  // Prototype values of Butterworth filters of order 3, 5, 7: 2 sin((2k − 1)π/(2n)). Order 3 splits C over two nodes.
  it.each([
    ['split-2', 3],
    ['split-3', 5],
    ['split-4', 7],
  ] as const)('independent: %s against a Butterworth ladder solved here', (kind, order) => {
    const elements = Array.from(
      { length: order },
      (_, k) => 2 * Math.sin(((2 * k + 1) * Math.PI) / (2 * order)),
    )
    expect(ladder(elements, 1)).toBeCloseTo(Math.SQRT1_2, 9)
    const total = elements.filter((_, k) => k % 2 === 0).reduce((sum, g) => sum + g, 0)
    // A lumped C of that total has its pole at 2/C; the ladder's lies at 1.
    expect(Math.abs(extensionFactor(kind, PLAIN) / (total / 2) - 1)).toBeLessThan(0.01)
  })

  it('independent: a resistor off by its tolerance alone reflects tol/(2 ± tol)', () => {
    expect(returnLoss.run(55, 50, 1, 1e-20)).toBeCloseTo(-20 * Math.log10(5 / 105), 6)
    expect(returnLoss.run(45, 50, 1, 1e-20)).toBeCloseTo(-20 * Math.log10(5 / 95), 6)
  })
})

describe.each(PADS)('the %s pad', (_, block) => {
  it('law: rate, protection and bump lower the margin; extension raises it', () => {
    expect(margin(block, { data_rate: 112e9 })).toBeLessThan(margin(block))
    expect(margin(block, { pads: { cdm_current: 6 } })).toBeLessThan(margin(block))
    expect(margin(block, { pads: { bump: 'wire-bond' } })).toBeLessThan(margin(block))
    expect(margin(block, { pads: { bump: 'micro-bump' } })).toBeGreaterThan(margin(block))
    expect(margin(block, { pads: { extension: 'T-coil' } }) / margin(block)).toBeCloseTo(1.41, 12)
  })

  it('law: return loss is judged only when asked, at the worse end of the termination', () => {
    const asked = block.checks.find(({ name }) => name === 'return_loss')!.asked!
    expect([asked(caseOf(28)), asked(caseOf(28, { pads: RL }))]).toEqual([false, true])
    const at = (tolerance: number) =>
      margin(block, { pads: RL, transmitter: { termination_tolerance: tolerance } }, 'return_loss')
    expect(at(0.1)).toBeLessThan(at(0))
    expect(margin(block, { pads: { return_loss: { at_least: 8, at: 20e9 } } }, 'return_loss')).toBeLessThan(
      at(0.1),
    )
  })

  it('says when no network at all could hold what is asked, and never asks for less protection', () => {
    const over = { pads: { return_loss: { at_least: 30, at: 28e9 } } }
    const found = outcomeOf(caseOf(28, over), block, 'return_loss')
    expect(found.reason).toMatch(/no lossless network/)
    expect(`${found.reason} ${found.basis}`).not.toMatch(/less protection|lower|reduce/)
  })

  it.each([
    ['built', {}],
    ['return loss', { pads: RL }],
    ['source-series', { transmitter: { kind: 'source-series' }, pads: { ...RL, extension: 'split-3' } }],
    ['stated', { pads: { ...RL, transmit_capacitance: 1.5e-13, receive_capacitance: 1.2e-13 } }],
    ['failing', { data_rate: 448e9, pads: { ...RL, bump: 'wire-bond' } }],
    ['driver without operating point', { supply: { voltage: 0.5 } }],
  ] as const)('evaluates with mathjs: %s', (_name, over) => {
    expect(walkAll(caseOf(28, over), block)).toBeGreaterThan(6)
  })
})

describe('results of the pads', () => {
  it('independent: a receive pad of 4 A at 25 fF/A, a 40 fF bump and a tenth for devices is 154 fF', () => {
    const found = resultsOf(caseOf(28), receivePad)
    expect(found['pad.receive.capacitance_F']!.value).toBeCloseTo(154e-15, 24)
    expect(found['pad.receive.bandwidth_Hz']!.value! / 41.339e9).toBeCloseTo(1, 4)
  })

  it("law: a larger swing hangs more of the driver's drain on the pad", () => {
    const at = (swing: number) =>
      resultsOf(caseOf(65, { transmitter: { swing } }), transmitPad)['pad.transmit.capacitance_F']!.value!
    expect(at(0.8)).toBeGreaterThan(at(0.4))
  })
})
