import { evaluate } from 'mathjs'
import { expect } from 'vitest'
import { benchAt, type Case } from '../../src/blocks/bench.ts'
import type { AnySubBlock, NamedResult, Outcome } from '../../src/blocks/sub-block.ts'
import { Recorder, type Step } from '../../src/derivation/recorder.ts'
import { PLAIN } from '../../src/derivation/trace.ts'
import { cornerPoint, type OperatingPoint, typicalPoint } from '../../src/device/conditions.ts'
import { type DeviceValues, type NodeValues, nodeKeys } from '../../src/nodes/keys.ts'
import type { Provenance } from '../../src/scenario/checked.ts'
import { optionKeys, type Settings } from '../../src/scenario/keys/index.ts'
import type { Key, Keys } from '../../src/scenario/schema.ts'
import { givenLeaves, knownLeaves } from '../../src/verdict/leaves.ts'

/**
 * Test benches: nodes with the starting values of the built-in classes, settings at their defaults, and the walk
 * over a derivation. Estimates throughout; tests on them check laws and arithmetic, not silicon.
 */

// L nm, V_DD, V_T0, n, mu0 cm²/Vs, v_sat 1e5 m/s, C_ox fF/µm², C_ext fF/µm, C_lay fF/µm, R_s Ω·µm, V_E V/µm, FO4 ps
const ROWS = {
  180: [180, 1.8, 0.45, 1.35, 330, 0.9, 8.4, 0.63, 0.5, 200, 22, 75],
  130: [120, 1.2, 0.36, 1.35, 300, 0.95, 11.5, 0.6, 0.5, 180, 22, 50],
  90: [70, 1.1, 0.34, 1.35, 270, 1, 14, 0.5, 0.42, 170, 22, 33],
  65: [50, 1.1, 0.36, 1.35, 250, 1, 15.5, 0.42, 0.4, 160, 24, 24],
  40: [40, 1.1, 0.38, 1.35, 230, 1.05, 17, 0.36, 0.38, 150, 26, 17],
  28: [30, 0.95, 0.37, 1.3, 220, 1.1, 20, 0.4, 0.42, 140, 34, 12],
  22: [22, 0.8, 0.32, 1.1, 220, 1.1, 22, 0.44, 0.46, 130, 60, 12],
  16: [22, 0.8, 0.33, 1.08, 200, 1.1, 24, 0.56, 0.62, 130, 110, 9],
  7: [18, 0.75, 0.29, 1.08, 170, 1.15, 27, 0.72, 0.88, 145, 100, 6],
  5: [16, 0.72, 0.28, 1.08, 170, 1.15, 28, 0.8, 1.05, 150, 100, 5.5],
} as const
export type NodeClass = keyof typeof ROWS

/** The starting values of a node class, SI. */
export function nodeOf(nm: NodeClass): NodeValues {
  const [L, core, V_T0, n, mu, v_sat, C_ox, C_ext, C_lay, R_s, V_E, fo4] = ROWS[nm]
  const planar = nm >= 28
  const device = (scale: number): DeviceValues => ({
    L: L * 1e-9,
    n,
    mu0: mu * 1e-4 * scale,
    v_sat: v_sat * 1e5 * scale,
    C_ox: C_ox * 1e-3,
    C_ext: C_ext * 1e-9,
    C_lay: C_lay * 1e-9,
    R_s: R_s * 1e-6,
    V_T0,
    V_E: V_E * 1e6,
    J_max: 550,
    J_peak: 350,
    gamma: 1.2,
    A_VT: 2e-9,
  })
  const nmos = device(1)
  return {
    format: 1,
    id: `T${nm}`,
    label: `${nm} nm test class`,
    based_on: null,
    class: nm * 1e-9,
    kind: planar ? 'planar' : nm === 22 ? 'thin-body' : 'fin',
    edition: null,
    supply: {
      core,
      analogue: null,
      io: 1.8,
      thick_limit: null,
      thick_peak: null,
      tolerance: 0.05,
      device_limit: 1.1 * core,
      peak_limit: 2 * core,
    },
    nmos,
    pmos: device(planar ? 0.45 : 0.9),
    thick: null,
    corners: { slow: { mu_factor: 0.9, V_T_shift: 0.04 }, fast: { mu_factor: 1.1, V_T_shift: -0.04 } },
    shares: { m: 0.28, d: 0.6, w: 0.35 },
    fo4: fo4 * 1e-12,
    wire_capacitance: 2e-10,
    inductor_q: 18,
    f_max: null,
    pads: { esd: (planar ? 25 : 35) * 1e-15, flip_chip: 40e-15, micro_bump: 15e-15, wire_bond: 80e-15 },
  }
}

const UNITS: Readonly<Record<string, (x: number) => number>> = {
  '': (x) => x,
  V: (x) => x,
  mV: (x) => x / 1000,
  '%': (x) => x / 100,
  Ω: (x) => x,
  dB: (x) => x,
  A: (x) => x,
  µm: (x) => x * 1e-6,
  fF: (x) => x * 1e-15,
  '°C': (x) => x + 273.15,
  'dBc/Hz': (x) => x,
  deg: (x) => x,
  fs: (x) => x * 1e-15,
  GHz: (x) => x * 1e9,
  kHz: (x) => x * 1e3,
  'nV/√Hz': (x) => x * 1e-9,
  ppm: (x) => x * 1e-6,
  µA: (x) => x * 1e-6,
}

/** The SI value of a default such as `0.30 V`; the tests' own small reader. */
function si(text: string): number {
  const [, value, unit] = /^(-?[\d.e-]+)\s*(.*)$/.exec(text)!
  return UNITS[unit!]!(Number(value))
}

function defaultOf(key: Key): unknown {
  if (key.type === 'group') return defaultsOf(key.keys)
  if (key.type === 'table') return {}
  if (!('default' in key) || key.default === undefined) return null
  if (key.type === 'quantity') return si(key.default)
  if (key.type === 'range') return key.default.map(si)
  return key.default
}

const defaultsOf = (keys: Keys): Record<string, unknown> =>
  Object.fromEntries(Object.entries(keys).map(([name, key]) => [name, defaultOf(key)]))

/** Overrides of settings, as deep as wanted. */
export type Overrides = { readonly [name: string]: unknown }

function merged(keys: Keys, base: Record<string, unknown> | null, over: Overrides): Record<string, unknown> {
  const out = { ...(base ?? defaultsOf(keys)) }
  for (const [name, value] of Object.entries(over)) {
    const key = keys[name]
    if (key === undefined) throw new Error(`no key ${name}`)
    const nested = (key.type === 'group' || key.type === 'section') && value !== null
    out[name] = nested
      ? merged(key.keys, out[name] as Record<string, unknown> | null, value as Overrides)
      : value
  }
  return out
}

/** Settings at their defaults, with overrides in SI. */
export const settingsOf = (over: Overrides = {}): Settings =>
  merged(optionKeys, null, over) as unknown as Settings

/** A link of 56 Gb/s PAM-4 at half rate (14 GHz clock), or a clock generator, in a test node. */
export function caseOf(
  nm: NodeClass | NodeValues,
  over: Overrides = {},
  block: 'link' | 'clock' = 'link',
): Case {
  const rate =
    block === 'link' ? { data_rate: 56e9, modulation: 'PAM-4', clocking: 'half-rate', error_ratio: 1e-6 } : {}
  const node = typeof nm === 'number' ? nodeOf(nm) : nm
  return { block, settings: settingsOf({ ...rate, ...over }), node, rules: {} }
}

/** Every number of a checked tree with its key's symbol, as the reader would state it. */
function provenanceOf(keys: Keys, values: Record<string, unknown>, path: string): readonly Provenance[] {
  return Object.entries(keys).flatMap(([name, key]) => {
    const value = values[name]
    const at = path === '' ? name : `${path}.${name}`
    if (value === null || value === undefined) return []
    if (key.type === 'group' || key.type === 'section') {
      return provenanceOf(key.keys, value as Record<string, unknown>, at)
    }
    return [
      {
        path: at,
        symbol: key.symbol ?? '',
        meaning: key.meaning,
        value: value as Provenance['value'],
        unit: 'unit' in key ? key.unit : '1',
        source: 'test',
        evidence: 'estimate',
        origin: 'default',
      },
    ]
  })
}

/** Slow, typical and fast at −40 and 125 °C with the lowest supply, and the typical point. */
export function pointsOf(given: Case): readonly OperatingPoint[] {
  const corners = (['slow', 'typical', 'fast'] as const).flatMap((corner) =>
    [233.15, 398.15].map((T) => cornerPoint(given.node, corner, T, 0.05, 0.025)),
  )
  return [typicalPoint(300.15), ...corners]
}

/** The outcome of a check at an operating point, the typical one unless stated. */
export function outcomeOf(given: Case, block: AnySubBlock, name: string, at = typicalPoint(300.15)): Outcome {
  return block.outcomes(benchAt(given, at, PLAIN), [placeOf(block, name)])[0]!
}

/** The smallest margin of a check over all points; NaN when unknown anywhere. */
export const worstMargin = (given: Case, block: AnySubBlock, name: string): number =>
  Math.min(...pointsOf(given).map((at) => outcomeOf(given, block, name, at).margin ?? Number.NaN))

/** Named results at an operating point, by name. */
export function resultsOf(
  given: Case,
  block: AnySubBlock,
  at = typicalPoint(300.15),
): Readonly<Record<string, NamedResult>> {
  return Object.fromEntries(block.results(benchAt(given, at, PLAIN)).map((found) => [found.name, found]))
}

function placeOf(block: AnySubBlock, name: string): number {
  const place = block.checks.findIndex((check) => check.name === name)
  if (place < 0) throw new Error(`no check ${name}`)
  return place
}

/**
 * Records a check and walks its steps: the same bits as the plain run, every input the value of an earlier
 * step, and every formula step evaluated by mathjs to 1e-9.
 */
export function walked(given: Case, block: AnySubBlock, name: string, at: OperatingPoint): readonly Step[] {
  const known = knownLeaves(
    givenLeaves(
      provenanceOf(optionKeys, given.settings as unknown as Record<string, unknown>, ''),
      provenanceOf(nodeKeys as Keys, given.node as unknown as Record<string, unknown>, ''),
    ),
    at,
  )
  const recorder = new Recorder(known)
  const outcome = block.outcomes(benchAt(given, at, recorder), [placeOf(block, name)])[0]!
  const plain = outcomeOf(given, block, name, at)
  expect([outcome.required, outcome.available, outcome.margin]).toEqual([
    plain.required,
    plain.available,
    plain.margin,
  ])
  const steps = recorder.steps(outcome.required, outcome.available, outcome.margin, outcome.alsoShown)
  const seen = new Map<string, number>()
  for (const step of steps) {
    for (const [input, from] of Object.entries(step.from)) expect(seen.get(from)).toBe(step.inputs[input])
    if (step.kind === 'formula') {
      const value = evaluate(step.formula, { ...step.inputs }) as number
      expect(Math.abs(value - step.value)).toBeLessThanOrEqual(1e-9 * Math.abs(step.value))
    }
    seen.set(step.id, step.value)
  }
  return steps
}

/** Walks every asked check of a sub-block at every point; returns how many formula steps were evaluated. */
export function walkAll(given: Case, block: AnySubBlock): number {
  let formulas = 0
  for (const at of pointsOf(given)) {
    for (const check of block.checks) {
      if (check.asked !== undefined && !check.asked(given)) continue
      formulas += walked(given, block, check.name, at).filter(({ kind }) => kind === 'formula').length
    }
  }
  return formulas
}
