import { evaluate } from 'mathjs'
import { describe, expect, it } from 'vitest'
import { layoutShare, loadFactor, PEAKING, type Peaking, shrink, stagePole } from '../../src/blocks/load.ts'

/** |Z/R|² of a bridged-shunt load at w = ωRC: C across the output, R + L (m = L/(R²C)) with k C across L. */
function loadSquared(w: number, m: number, k: number): number {
  const reactance = (w * m) / (1 - w * w * m * k)
  const [g, b] = [1 / (1 + reactance ** 2), w - reactance / (1 + reactance ** 2)]
  return 1 / (g * g + b * b)
}

/** Highest w with |Z/R|^(2n) = 1/2, searched from above by bisection inside the first crossing found upwards. */
function bandwidth(m: number, k: number, n: number): number {
  const level = 0.5 ** (1 / n)
  let [low, high] = [0, 0.001]
  while (loadSquared(high, m, k) >= level) {
    low = high
    high += 0.001
  }
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2
    if (loadSquared(middle, m, k) >= level) low = middle
    else high = middle
  }
  return low
}

const groupDelayM = 0.3221968772 // m³ + 3m = 1
const NETWORK: Readonly<Record<Peaking, readonly [number, number]>> = {
  none: [0, 0],
  'shunt-delay': [groupDelayM, 0],
  'shunt-flat': [Math.SQRT2 - 1, 0],
  'shunt-bridged': [1 / 2.4, 0.3],
}
const KINDS = Object.keys(NETWORK) as Peaking[]

describe('inductive peaking of one stage', () => {
  // values.json A10: Mohan et al., IEEE JSSC 35(3), 2000; Lee 2004, table 9.1; tolerance 0.01.
  it.each([
    ['none', 1],
    ['shunt-delay', 1.57217],
    ['shunt-flat', 1.72205],
  ] as const)('published: %s widens a stage as A10 states', (kind, expected) => {
    expect(Math.abs(PEAKING[kind].widening - expected)).toBeLessThan(0.01)
  })

  // values.json A11: Shekhar, Walling, Allstot, IEEE JSSC 41(11), 2006; tolerance 0.02.
  it('published: bridged shunt peaking at k = 0.3, m = 1/2.4 widens as A11 states', () => {
    expect(Math.abs(PEAKING['shunt-bridged'].widening - 1.84752)).toBeLessThan(0.02)
  })

  it.each(KINDS)('independent: %s agrees with the network solved here', (kind) => {
    const [m, k] = NETWORK[kind]
    expect(Math.abs(PEAKING[kind].widening - bandwidth(m, k, 1))).toBeLessThan(0.005)
  })

  it('independent: the network solved here reproduces A10 to its last digit', () => {
    expect(bandwidth(groupDelayM, 0, 1)).toBeCloseTo(1.57217, 4)
    expect(bandwidth(Math.SQRT2 - 1, 0, 1)).toBeCloseTo(1.72205, 4)
    expect(bandwidth(Math.SQRT1_2, 0, 1)).toBeCloseTo(1.84776, 4)
    expect(bandwidth(1 / 2.4, 0.3, 1)).toBeCloseTo(1.84752, 4)
  })
})

describe('shrinkage of cascades', () => {
  // values.json A07: Razavi 2003, ch. 5; √(2^(1/n) − 1); the table holds three decimals.
  it.each([
    [1, 1],
    [2, 0.643594],
    [3, 0.509825],
    [4, 0.434979],
  ])('published: %i stages without peaking', (n, expected) => {
    expect(Math.sqrt(2 ** (1 / n) - 1)).toBeCloseTo(expected, 6)
    expect(Math.abs(shrink(n, 'none') - expected)).toBeLessThan(1e-3)
  })

  it.each(KINDS.flatMap((kind) => [1, 2, 3, 4].map((n) => [kind, n] as const)))(
    'independent: %s, %i stages, solved as |H|^2n = 1/2',
    (kind, n) => {
      const [m, k] = NETWORK[kind]
      expect(Math.abs(shrink(n, kind) - bandwidth(m, k, n) / bandwidth(m, k, 1))).toBeLessThan(1e-3)
    },
  )

  it('law: more stages never widen a chain, and more peaking never narrows it', () => {
    for (const kind of KINDS) {
      for (const n of [2, 3, 4]) expect(shrink(n, kind)).toBeLessThan(shrink(n - 1, kind))
    }
    for (const n of [2, 3, 4]) {
      KINDS.slice(1).forEach((kind, k) => {
        expect(shrink(n, kind)).toBeGreaterThan(shrink(n, KINDS[k]!))
      })
    }
  })
})

describe('the current-mode load', () => {
  // values.json A14: Razavi 2003; g_m 10 mS, R 200 Ω, C 20 fF, so A = 2, bandwidth 39.7887 GHz.
  it('published: a stage pole is the device speed over gain and load', () => {
    const [g_m, R, C, C_gg] = [0.01, 200, 2e-14, 5e-15]
    const f_T = g_m / (2 * Math.PI * C_gg)
    expect(stagePole.run(1, f_T, g_m * R, C / C_gg) / 39788700000).toBeCloseTo(1, 4)
  })

  it('law: the load is what hangs on the node, counted in gate capacitances', () => {
    const [C_gg, C_lay, C_gd, C_dd, C_w] = [1e-9, 0.6e-9, 0.28e-9, 0.6e-9, 0.35e-9]
    const [phi, A] = [2, 1.4]
    const total = phi * (C_gg + A * C_gd + C_lay) + C_dd + C_w
    const c_lay = layoutShare.run(C_lay, C_gg)
    const l = loadFactor.run(phi, A, C_gd / C_gg, c_lay, C_dd / C_gg, C_w / C_gg)
    expect(l * C_gg).toBeCloseTo(total, 15)
    const inputs = { phi, A, m: 0.28, c_lay, d: 0.6, w: 0.35 }
    expect(evaluate(loadFactor.text.expression, inputs)).toBeCloseTo(l, 12)
  })
})

describe('stages that share a gain (values.json A08: Razavi 2003, ch. 5; R. P. Jindal 1987)', () => {
  /** Bandwidth of n unpeaked stages of gain A in all, over the gain–bandwidth product of one. */
  const bandwidth = (A: number, n: number): number =>
    (stagePole.run(1, 1, A ** (1 / n), 1) * shrink(n, 'none')) / 1

  it('published: a gain of 10 is widest over four stages', () => {
    const widths = [1, 2, 3, 4].map((n) => bandwidth(10, n))
    expect(widths.indexOf(Math.max(...widths))).toBe(3)
    // BWtot/GBW = A^(-1/n) sqrt(2^(1/n) - 1), the closed form of A08, at n = 4.
    expect(Math.abs(widths[3]! / (10 ** -0.25 * Math.sqrt(2 ** 0.25 - 1)) - 1)).toBeLessThan(1e-3)
  })
})
