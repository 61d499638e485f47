import { formula } from '../derivation/formula.ts'
import { marginAtLeast } from '../derivation/margin.ts'
import type { Trace } from '../derivation/trace.ts'
import { type DeviceHere, deviceAt, typicalPoint } from '../device/conditions.ts'
import { fo4At } from '../device/fo4.ts'
import { onResistanceAt } from '../device/switch.ts'
import type { Bench } from './bench.ts'
import { dataBandwidth } from './current-mode-driver.ts'
import { peakingFactor } from './load.ts'
import { combineRoutes, ruleRoute } from './stage-speed.ts'
import type { Outcome } from './sub-block.ts'

/** A source-series-terminated driver: full-swing slices behind resistors, driven by CMOS gates at the core supply. */

/** R_slice = 0.3 R0: all slices in parallel. R0 [Ω] → [Ω]. */
export const sliceResistance = formula(
  {
    symbol: 'R_slice',
    meaning: 'largest on-resistance of all slices in parallel; the rest of R0 is a resistor',
    unit: 'ohm',
    source: 'common practice, no source',
  },
  (R0) => 0.3 * R0,
)

/** W = R_on/R_slice. R_on [Ω m] on-resistance times width, R_slice [Ω] → [m]. */
export const sliceWidth = formula(
  { symbol: 'W', meaning: 'width of all slices together', unit: 'm', source: 'definition' },
  (R_on, R_slice) => R_on / R_slice,
)

/** C_on = L C_ox + C_ext + C_lay, per width. L [m], C_ox [F/m²], C_ext [F/m], C_lay [F/m] → [F/m]. */
export const triodeGate = formula(
  {
    symbol: 'C_on',
    meaning: 'gate capacitance per width of a device in the triode region, as laid out',
    unit: 'F/m',
    source: 'circuit theory: the channel reaches from source to drain',
  },
  (L, C_ox, C_ext, C_lay) => L * C_ox + C_ext + C_lay,
)

/** C = W_n C_n + W_p C_p. W_n [m], C_n [F/m], W_p [m], C_p [F/m] → [F]. */
export const sliceGate = formula(
  {
    symbol: 'C_gate',
    meaning: 'gate capacitance of all slices as laid out',
    unit: 'F',
    source: 'definition',
  },
  (W_n, C_n, W_p, C_p) => W_n * C_n + W_p * C_p,
)

/** C_drain = d C_gate. d [1], C_gate [F] → [F]. */
export const sliceDrain = formula(
  {
    symbol: 'C_device',
    meaning: 'drain capacitance of all slices as laid out',
    unit: 'F',
    source: 'definition of the drain share',
  },
  (d, C_gate) => d * C_gate,
)

/** f_gate = 1/(2π R_slice C_gate): the slices charge gates like their own. R_slice [Ω], C_gate [F] → [Hz]. */
export const sliceSpeed = formula(
  {
    symbol: 'f_gate',
    meaning: 'frequency at which slices charge gates of their own size',
    unit: 'Hz',
    source: 'derived: on-resistance and gate capacitance of the same devices; their width cancels',
  },
  (R_slice, C_gate) => 1 / (2 * Math.PI * R_slice * C_gate),
)

/** f_gate ≥ BW (φ + d). BW [Hz], phi [1] slices over pre-driver, d [1] drain share → [Hz]. */
export const sliceDemand = formula(
  {
    symbol: 'f_gate_req',
    meaning: 'speed of the devices that lets the pre-driver charge the slices',
    unit: 'Hz',
    source: 'derived: the pre-driver is a copy of the slices, φ times smaller, with its own drains',
  },
  (BW, phi, d) => BW * (phi + d),
)

/** UI_min = 2.5 FO4 max(1, (φ + d)/(4 + d)). FO4_here [s], phi [1] pre-driver fan-out, d [1] drain share → [s]. */
export const shortestSymbol = formula(
  {
    symbol: 'UI_min',
    meaning: 'shortest unit interval that a CMOS 2:1 and its pre-driver carry',
    unit: 's',
    source:
      'common practice, no source: 2.5 fan-out-of-four delays; beyond a fan-out of four the delay grows with load',
  },
  (FO4_here, phi, d) => 2.5 * FO4_here * Math.max(1, (phi + d) / (4 + d)),
)

/** Slices and pre-driver at an operating point. SI. */
export interface SeriesDriver {
  readonly R_slice: number
  readonly W_n: number
  readonly W_p: number
  readonly C_gate: number
  readonly C_drain: number
}

function gateOf({ of: { L, C_ox, C_ext, C_lay } }: DeviceHere, t: Trace): number {
  return t.calc(triodeGate, L, C_ox, C_ext, C_lay)
}

/** Slices whose on-resistance is 0.3 R0 at the lowest core supply, where they are weakest. */
export function seriesDriver({ nmos, pmos, V_core, settings, node, t }: Bench): SeriesDriver {
  const R_slice = t.calc(sliceResistance, settings.transmitter.termination)
  const W_n = t.calc(sliceWidth, onResistanceAt(nmos, V_core, t), R_slice)
  const W_p = t.calc(sliceWidth, onResistanceAt(pmos, V_core, t), R_slice)
  const C_gate = t.calc(sliceGate, W_n, gateOf(nmos, t), W_p, gateOf(pmos, t))
  return { R_slice, W_n, W_p, C_gate, C_drain: t.calc(sliceDrain, node.shares.d, C_gate) }
}

/** Whether the devices of slices and pre-driver are fast enough, by the rule of thumb and by their gates. */
export function slicesOutcome({ R_slice, C_gate }: SeriesDriver, bench: Bench): Outcome {
  const { settings, node, rates, t, V_core } = bench
  const f_N = rates.f_N!
  const BW = t.calc(dataBandwidth, settings.receiver.bandwidth_factor, f_N)
  const required = t.calc(sliceDemand, BW, settings.transmitter.driver_fan_out, node.shares.d)
  const available = t.calc(sliceSpeed, R_slice, C_gate)
  const derived = { required, available, margin: t.calc(marginAtLeast, available, required) }
  const beta = peakingFactor(settings.peaking.transmit, t)
  const rule = ruleRoute(
    { key: 'driver', f_op: f_N, of: 'f_N', k: settings.demand.multiples.driver, beta },
    bench,
  )
  return { ...combineRoutes(rule, derived, bench, 'the gates of slices of 0.3 R0'), supply: V_core }
}

const TYPICAL_300K = typicalPoint(300)

/** Whether the CMOS gates in front of the slices keep up with the symbols. */
export function symbolOutcome(bench: Bench): Outcome {
  const { settings, node, nmos, rates, V_core, t } = bench
  const { driver_fan_out, multiplexer } = settings.transmitter
  const delay = fo4At(node, nmos, deviceAt(node.nmos, TYPICAL_300K, t), V_core, t)
  const required = t.calc(shortestSymbol, delay, driver_fan_out, node.shares.d)
  const available = rates.UI!
  return {
    required,
    available,
    margin: t.calc(marginAtLeast, available, required),
    basis: "fan-out-of-four delay of the node's devices at the lowest core supply",
    supply: V_core,
    ...(multiplexer === '2:1'
      ? {}
      : { reason: 'a CMOS 4:1 is judged like a 2:1: the pre-driver carries the same symbols' }),
  }
}

const STATED_SWING = {
  symbol: 'required',
  meaning: 'stated output swing',
  unit: 'V',
  source: 'scenario',
  path: 'transmitter.swing',
}

/** Matched at both ends, the differential peak-to-peak output cannot exceed the supply. */
export function swingOutcome({ settings, V_core, t }: Bench): Outcome {
  const required = t.leaf(STATED_SWING, settings.transmitter.swing)
  return {
    required,
    available: V_core,
    margin: t.calc(marginAtLeast, V_core, required),
    basis: 'derived: ±V behind R0 on both sides halves to ±V/2 in the matched load',
    supply: V_core,
  }
}
