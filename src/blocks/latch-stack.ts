import { formula } from '../derivation/formula.ts'
import { PLAIN, type Trace } from '../derivation/trace.ts'
import type { DeviceHere } from '../device/conditions.ts'
import { sourceAbove, tailVoltage } from '../device/stacks/lines.ts'
import { switchedPair } from '../device/stacks/switched-pair.ts'
import type { Stage } from '../device/stage.ts'
import { SWITCH_FLOOR, saturationVoltageAt } from '../device/voltage.ts'
import { type Bench, nominalStackSupply } from './bench.ts'

/** Below this nominal supply a latch is built without its tail source, unless the scenario says otherwise [V]. */
export const TAIL_LESS_BELOW = 0.9

/** A data pair on a clock pair: latch, multiplexer, interpolator, flip-flop. */
export interface LatchStack {
  readonly stage: Stage
  /** Voltage below the clock pair [V]; 0 without a tail. */
  readonly V_tail: number
  readonly V_sw: number
  /** Lowest source of the data pair while its clock pair conducts [V]: what device stress is judged from. */
  readonly V_off: number
}

/** V_off = V_tail + c_sat U_T: the clock pair at the edge of saturation. V_tail [V], c_sat [1], U_T [V] → [V]. */
export const lowestDataSource = formula(
  {
    symbol: 'V_S',
    meaning: 'lowest source of the data pair while its clock pair conducts',
    unit: 'V',
    source: 'derived: the clock pair keeps its least saturation voltage',
  },
  (V_tail, c_sat, U_T) => V_tail + c_sat * U_T,
)

/**
 * The stack of latches, multiplexers and interpolators: a data pair on a clock pair, the clock ac-coupled, on a
 * tail source or, below 0.9 V, without one.
 *
 * @param bench case at its operating point
 * @param device transistor of the stack
 * @param V_sw single-ended swing [V]
 * @param A least small-signal gain [1]
 * @param t trace
 */
export function latchStack(bench: Bench, device: DeviceHere, V_sw: number, A: number, t: Trace): LatchStack {
  const { headroom } = bench.settings
  const V_tail = hasTail(bench) ? t.calc(tailVoltage, headroom.tail, device.U_T) : t.leaf(NO_TAIL, 0)
  const stage = switchedPair({
    device,
    V_sw,
    V_sw_in: V_sw,
    A,
    V_m: headroom.reserve,
    V_tail,
    coupling: 'dc',
    clockPairBelow: true,
    c_sat: t.leaf(SWITCH_FLOOR, SWITCH_FLOOR.value),
    ownSaturation: true,
  })
  const c_sat = t.leaf(SWITCH_FLOOR, SWITCH_FLOOR.value)
  return { stage, V_tail, V_sw, V_off: t.calc(lowestDataSource, V_tail, c_sat, device.U_T) }
}

const NO_TAIL = {
  symbol: 'V_tail',
  meaning: 'no tail source: the clock pair stands on ground',
  unit: 'V',
  source: 'method of this planner: tail-less stacks below 0.9 V',
}

function hasTail({ settings, node }: Bench): boolean {
  const { latch_stack } = settings.headroom
  if (latch_stack !== 'by-supply') return latch_stack === 'three-high'
  const chosen = nominalStackSupply(settings, node)
  return 'missing' in chosen || chosen.V_nom >= TAIL_LESS_BELOW
}

/** Source voltage [V] of the data pair, one saturated clock pair above V_tail [V], at current per width J [A/m]. */
export function aboveClockPair(device: DeviceHere, J: number, V_tail: number): number {
  return sourceAbove.run(V_tail, saturationVoltageAt(device, J, SWITCH_FLOOR.value, PLAIN))
}
