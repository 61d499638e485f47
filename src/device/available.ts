import type { Trace } from '../derivation/trace.ts'
import { PLAIN } from '../derivation/trace.ts'
import { rootBetween } from '../numeric/root.ts'
import { type Line, type RootIn, type Stage, type Window, windowOf } from './stage.ts'

/** Relative tolerance of every search for a current per width, in √J. */
const TOLERANCE = 1e-10
const TOLERANCE_SHOWN = '1e-10 relative in √J'

/** Searches run in √J, in which voltages, speed and A J/g_m are all nearly straight lines. */
const rootInSquare: RootIn = (f, J_a, J_b) => rootKnown(f, J_a, f(J_a), J_b, f(J_b))

function rootKnown(f: (J: number) => number, J_a: number, f_a: number, J_b: number, f_b: number): number {
  return rootBetween((x) => f(x * x), Math.sqrt(J_a), f_a, Math.sqrt(J_b), f_b, TOLERANCE, true) ** 2
}

/** The most a stage can have under its supply. */
export type Capability =
  | {
      /** Current per width [A/m] of the highest speed. */
      readonly J: number
      readonly binding: Line
    }
  | {
      readonly J: null
      readonly binding: Line
      readonly window: Window
      /** Lowest supply that has any operating point [V]; null when no supply has. */
      readonly V_any: number | null
    }

/**
 * The current per width at which a stage is fastest while every line of its stack holds.
 *
 * @param stage lines and speed of the stage
 * @param V lowest supply of the case [V]
 * @param t trace: the search is written down as one step
 * @returns current per width [A/m] and the line that binds, or none with the lowest supply that has any
 */
export function capability(stage: Stage, V: number, t: Trace): Capability {
  const spare = (x: number): number => {
    const J = x * x
    return Math.min(V - stage.supplyNeeded(J, PLAIN), stage.swingSpare(J))
  }
  const [low, high] = [Math.sqrt(stage.J_low), Math.sqrt(stage.J_lim)]
  const atHigh = spare(high)
  if (atHigh >= 0) return settled(stage, stage.J_lim, 'density', V, t)
  const atLow = spare(low)
  if (atLow < 0) return noPoint(stage)
  const J = rootBetween(spare, low, atLow, high, atHigh, TOLERANCE, true) ** 2
  const bySwing = stage.swingSpare(J) < V - stage.supplyNeeded(J, PLAIN)
  return settled(stage, J, bySwing ? 'gain–swing' : stage.bindingAt(J), V, t)
}

/** The capability when the upper end of J is known: own saturation must hold there, and speed not have fallen. */
function settled(stage: Stage, top: number, binding: Line, V: number, t: Trace): Capability {
  if (stage.ownSpare(top) < 0) return noPoint(stage)
  const before = top * 0.98
  const J = stage.speed(top, PLAIN) >= stage.speed(before, PLAIN) ? top : fastestBelow(stage, top)
  return { J: J === stage.J_lim ? J : noteDensity(J, stage, binding, V, t), binding }
}

function noPoint(stage: Stage): Capability {
  const window = windowOf(stage, rootInSquare)
  if (window.impossible !== undefined) return { J: null, binding: window.endedBy, window, V_any: null }
  const V_any = stage.supplyNeeded(window.J_from, PLAIN)
  return { J: null, binding: stage.bindingAt(window.J_from), window, V_any }
}

/** The J of the highest speed where speed falls again before the upper end: golden section in ln J. */
function fastestBelow(stage: Stage, top: number): number {
  const golden = (Math.sqrt(5) - 1) / 2
  let [a, b] = [Math.log(windowOf(stage, rootInSquare).J_from), Math.log(top)]
  while (b - a > 1e-7) {
    const left = b - golden * (b - a)
    const right = a + golden * (b - a)
    if (stage.speed(Math.exp(left), PLAIN) > stage.speed(Math.exp(right), PLAIN)) b = right
    else a = left
  }
  return Math.exp((a + b) / 2)
}

function noteDensity(J: number, stage: Stage, binding: Line, V: number, t: Trace): number {
  if (!t.recording) return J
  t.search(
    {
      symbol: 'J',
      meaning: `largest current per width that the stack allows (bound by: ${binding})`,
      unit: 'A/m',
      source: 'search over the current per width; the lines are those of the stage',
      residual: binding === 'gain–swing' ? 'V_sw - A J/g_m(J)' : 'V - V_need(J)',
      tolerance: TOLERANCE_SHOWN,
    },
    J,
    { ...stage.givens, V },
  )
  const bySwing = binding === 'gain–swing' && stage.swingNeeded !== undefined
  t.show(bySwing ? stage.swingNeeded(J, t) : stage.supplyNeeded(J, t), J)
  return J
}

/** Speed [Hz] that a circuit needs when its devices carry J [A/m]. */
export type Demand = (J: number, t: Trace) => number

/** A current per width and whether it gives what was wanted. */
export interface Density {
  readonly J: number
  readonly reached: boolean
}

/**
 * The smallest current per width at which a stage's speed reaches a multiple of its demand, whatever the supply;
 * the largest admissible one when the speed is out of reach.
 *
 * @param stage lines and speed of the stage
 * @param found what the stage can do under its supply
 * @param demand speed the circuit needs
 * @param times multiple of the demand to reach [1]: 1 is break-even, 1 + guard the design point
 * @returns J [A/m] and whether the speed is reached there
 */
export function densityForSpeed(stage: Stage, found: Capability, demand: Demand, times: number): Density {
  const spare = (J: number): number => stage.speed(J, PLAIN) - times * demand(J, PLAIN)
  const atTop = found.J === null ? -1 : spare(found.J)
  if (found.J !== null && atTop >= 0) {
    const atLow = spare(stage.J_low)
    const J = atLow >= 0 ? stage.J_low : rootKnown(spare, stage.J_low, atLow, found.J, atTop)
    const own = stage.ownSpare(J) >= 0 ? J : rootInSquare(stage.ownSpare, J, found.J)
    return { J: own, reached: true }
  }
  const window = windowOf(stage, rootInSquare)
  if (spare(window.J_to) < 0) return { J: window.J_to, reached: false }
  const J = spare(window.J_from) >= 0 ? window.J_from : rootInSquare(spare, window.J_from, window.J_to)
  return { J, reached: true }
}
