import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { gateCapacitanceOf } from '../device/speed.ts'
import { halfDensity, tailVoltage } from '../device/stacks/lines.ts'
import { outputDrop, outputPair, outputTop } from '../device/stacks/output-pair.ts'
import { SWITCH_FLOOR } from '../device/voltage.ts'
import type { Bench, StackSupply } from './bench.ts'
import { layoutShare, loadFactor, peakingFactor, poleDemand } from './load.ts'
import type { Stacked } from './stack-checks.ts'
import { type StageSpeed, stageSpeed } from './stage-speed.ts'

/** A current-mode output stage: its speed question and its size. */

/** I = V_ppd/R0: the current flows into both terminations. V_ppd [V] differential peak to peak, R0 [Ω] → [A]. */
export const driverCurrent = formula(
  {
    symbol: 'I',
    meaning: 'tail current of the output stage',
    unit: 'A',
    source: 'derived: each side swings I R0/2 on the double termination, differentially twice that',
  },
  (V_ppd, R0) => V_ppd / R0,
)

/** W = I/J. I [A], J [A/m] → [m]. */
export const driverWidth = formula(
  { symbol: 'W', meaning: 'width of each output device', unit: 'm', source: 'definition' },
  (I, J) => I / J,
)

/** C_drain = d C_gg W. d [1], C_gg [F/m], W [m] → [F]. */
export const drainCapacitance = formula(
  {
    symbol: 'C_device',
    meaning: 'drain capacitance that the driver hangs on the pad',
    unit: 'F',
    source: 'definition of the drain share',
  },
  (d, C_gg, W) => d * C_gg * W,
)

/** C_gate = (C_gg + C_lay) W. C_gg [F/m], C_lay [F/m], W [m] → [F]. */
export const driverGate = formula(
  { symbol: 'C_gate', meaning: 'gate capacitance of each output device', unit: 'F', source: 'definition' },
  (C_gg, C_lay, W) => (C_gg + C_lay) * W,
)

/** BW = κ_b f_N. kappa_b [1], f_N [Hz] → [Hz]. */
export const dataBandwidth = formula(
  {
    symbol: 'BW',
    meaning: 'bandwidth that the data path needs',
    unit: 'Hz',
    source: 'common practice, no source: 1.0 to 1.5 times the Nyquist frequency',
  },
  (kappa_b, f_N) => kappa_b * f_N,
)

/**
 * The output stage on a stacked supply, and the pre-driver that charges it.
 *
 * The demand is that of the pre-driver: both carry the same current per width, the output stage is its load.
 */
export function currentModeDriver(bench: Bench, stack: Exclude<StackSupply, { missing: string }>): Stacked {
  const { settings, node, rates, t } = bench
  const { device, V, V_high } = stack
  const { swing, driver_fan_out: phi } = settings.transmitter
  const A = settings.clock.gain
  const V_tail = t.calc(tailVoltage, settings.headroom.tail, device.U_T)
  const beta = peakingFactor(settings.peaking.transmit, t)
  const stage = outputPair({
    device,
    V_low: t.calc(outputDrop, swing),
    V_sw_in: settings.headroom.clock_swing,
    A,
    V_m: settings.headroom.reserve,
    V_tail,
    c_sat: t.leaf(SWITCH_FLOOR, SWITCH_FLOOR.value),
  })
  const BW = t.calc(dataBandwidth, settings.receiver.bandwidth_factor, rates.f_N!)
  const { m, d, w } = node.shares
  const demand = (J: number, trace: Trace): number => {
    const C_gg = gateCapacitanceOf(device, trace.calc(halfDensity, J), trace)
    const c_lay = trace.calc(layoutShare, device.of.C_lay, C_gg)
    return trace.calc(poleDemand, BW, A, trace.calc(loadFactor, phi, A, m, c_lay, d, w), beta)
  }
  const rule = { key: 'driver', f_op: rates.f_N!, of: 'f_N', k: settings.demand.multiples.driver, beta }
  return {
    speed: stageSpeed({ stage, V, rule, demand }, t),
    V_S: V_tail,
    V_high: t.calc(outputTop, V_high, swing),
  }
}

/** Size of a current-mode output stage: tail current [A], width [m], capacitances [F]. */
export interface DriverSize {
  readonly I: number
  readonly W: number
  readonly C_drain: number
  readonly C_gate: number
  /** False without an operating point: sized at the largest admissible current per width. */
  readonly operates: boolean
}

/**
 * Size of the output stage at its capability: the narrowest that its lines allow, since its drains load the pad. At
 * the design point, the slowest bias that is fast enough, it would be several times wider for nothing.
 */
export function driverSize(
  speed: StageSpeed,
  { device }: Exclude<StackSupply, { missing: string }>,
  bench: Bench,
): DriverSize {
  const { t, settings, node } = bench
  const I = t.calc(driverCurrent, settings.transmitter.swing, settings.transmitter.termination)
  const found = speed.capability.J
  const J = found ?? device.J_lim
  const W = t.calc(driverWidth, I, J)
  const C_gg = gateCapacitanceOf(device, t.calc(halfDensity, J), t)
  return {
    I,
    W,
    C_drain: t.calc(drainCapacitance, node.shares.d, C_gg, W),
    C_gate: t.calc(driverGate, C_gg, device.of.C_lay, W),
    operates: found !== null,
  }
}
