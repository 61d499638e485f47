import { PLAIN, type Trace } from '../../derivation/trace.ts'
import { type Charge, chargeAt } from '../charge.ts'
import type { DeviceHere } from '../conditions.ts'
import { speedAt, transconductanceAt } from '../speed.ts'
import { type Line, NO_LINE, type Stage } from '../stage.ts'
import { gateVoltageOf, SWITCH_FLOOR, saturationVoltageOf } from '../voltage.ts'
import {
  clockInput,
  crossingInput,
  halfDensity,
  largerOfTwo,
  largestOfThree,
  sourceAbove,
  swingOfGain,
  switchedInput,
  switchedOutput,
} from './lines.ts'

/** What a switched pair is asked to do. */
export interface SwitchedPair {
  readonly device: DeviceHere
  /** Single-ended swing I_tail R [V] and that of the driving stage [V]. */
  readonly V_sw: number
  readonly V_sw_in: number
  /** Least small-signal gain [1]; below 1 a stage cannot switch its successor. */
  readonly A: number
  /** Voltage kept in hand [V]. */
  readonly V_m: number
  /** Tail voltage [V]; 0 without a tail. */
  readonly V_tail: number
  readonly coupling: 'dc' | 'ac'
  /** A clock pair below the data pair, carrying the same current per width: latches, multiplexers, interpolators. */
  readonly clockPairBelow: boolean
  /** Floor of the saturation voltage in U_T: gain devices 4, clock and latch pairs 3 [1]. */
  readonly c_sat: number
  /** Whether own saturation binds: pairs that are dc-coupled or cross-coupled. */
  readonly ownSaturation: boolean
}

/** How far a logic stage may enter the triode region before it slows [V]. Common practice, no source. */
const LOGIC_ALLOWANCE = 0.1

/** What is made of the four lines: their largest, or the name of it. Lines that do not apply are −∞. */
type Fold<T> = (
  pair: SwitchedPair,
  t: Trace,
  V_input: number,
  V_cross: number,
  V_out: number,
  V_clock: number,
) => T

/** The lines of a switched pair at full tail current per width J [A/m]. Folded in place: this is the hot path. */
function foldLines<T>(pair: SwitchedPair, J: number, t: Trace, fold: Fold<T>): T {
  const { device, V_tail, V_m, V_sw, clockPairBelow } = pair
  const charge = chargeAt(device, J, t)
  const V_clockSat = clockPairBelow ? clockSaturation(pair, J, charge, t) : 0
  const V_S = clockPairBelow ? t.calc(sourceAbove, V_tail, V_clockSat) : V_tail
  const V_DSsat = saturationVoltageOf(device, J, charge, pair.c_sat, t)
  return fold(
    pair,
    t,
    t.calc(switchedInput, gateVoltageOf(device, J, charge, V_S, t), V_S, V_m),
    pair.coupling === 'dc' ? crossingAt(pair, J, V_S, t) : Number.NEGATIVE_INFINITY,
    t.calc(switchedOutput, V_S, V_DSsat, V_m, V_sw),
    clockPairBelow
      ? t.calc(clockInput, gateVoltageOf(device, J, charge, V_tail, t), V_tail, V_m, V_clockSat)
      : Number.NEGATIVE_INFINITY,
  )
}

function clockSaturation({ device }: SwitchedPair, J: number, charge: Charge, t: Trace): number {
  return saturationVoltageOf(device, J, charge, t.leaf(SWITCH_FLOOR, SWITCH_FLOOR.value), t)
}

function crossingAt(pair: SwitchedPair, J: number, V_S: number, t: Trace): number {
  const J_half = t.calc(halfDensity, J)
  const V_GS = gateVoltageOf(pair.device, J_half, chargeAt(pair.device, J_half, t), V_S, t)
  return t.calc(crossingInput, V_GS, V_S, pair.V_sw_in, pair.V_m)
}

const largest: Fold<number> = (pair, t, V_input, V_cross, V_out, V_clock) => {
  if (pair.clockPairBelow && pair.coupling === 'dc') {
    return t.calc(largerOfTwo, t.calc(largestOfThree, V_input, V_cross, V_out), V_clock)
  }
  if (pair.clockPairBelow) return t.calc(largestOfThree, V_input, V_out, V_clock)
  if (pair.coupling === 'dc') return t.calc(largestOfThree, V_input, V_cross, V_out)
  return t.calc(largerOfTwo, V_input, V_out)
}

const binding: Fold<Line> = (_pair, _t, V_input, V_cross, V_out, V_clock) => {
  const most = Math.max(V_input, V_cross, V_out, V_clock)
  if (most === V_input) return 'switched input'
  if (most === V_cross) return 'crossing'
  return most === V_out ? 'output' : 'clock input'
}

/** Volts that own saturation leaves at J: V_GS − V_DSsat + 0.1 V − V_sw, the source at its lowest. */
function ownSpareAt(pair: SwitchedPair, J: number): number {
  const charge = chargeAt(pair.device, J, PLAIN)
  const V_S = pair.clockPairBelow ? pair.V_tail + clockSaturation(pair, J, charge, PLAIN) : pair.V_tail
  const V_GS = gateVoltageOf(pair.device, J, charge, V_S, PLAIN)
  return V_GS - saturationVoltageOf(pair.device, J, charge, pair.c_sat, PLAIN) + LOGIC_ALLOWANCE - pair.V_sw
}

/**
 * A differential pair that switches its whole tail current, on a tail source or on a clock pair.
 *
 * J is the full tail current per width of one device: gate and saturation voltages are those of the switched
 * condition at J; transconductance, capacitance and speed those at the crossing, at J/2.
 *
 * @param pair devices, swings [V], gain [1], reserve [V], coupling and stack
 * @returns the stage: supply it needs [V], speed f_T,int at J/2 [Hz]
 */
export function switchedPair(pair: SwitchedPair): Stage {
  const { device, V_sw, A } = pair
  const swing = (J: number, t: Trace): number =>
    t.calc(swingOfGain, A, J, transconductanceAt(device, t.calc(halfDensity, J), t))
  return {
    J_low: 0.01 * (device.I_spec / device.of.L),
    J_lim: device.J_lim,
    gainSwing: V_sw,
    ownSwing: V_sw,
    supplyNeeded: (J, t) => foldLines(pair, J, t, largest),
    bindingAt: (J) => foldLines(pair, J, PLAIN, binding),
    swingNeeded: swing,
    swingSpare: (J) => V_sw - swing(J, PLAIN),
    ownSpare: pair.ownSaturation ? (J) => ownSpareAt(pair, J) : NO_LINE,
    speed: (J, t) => speedAt(device, t.calc(halfDensity, J), t).f_T_int,
    c_sat: pair.c_sat,
    givens: { V_sw, A, V_m: pair.V_m },
  }
}
