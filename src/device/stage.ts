import type { Trace } from '../derivation/trace.ts'

/** What binds a stage: the line of method 1.1 that stops the current per width from rising further. */
export type Line =
  | 'density'
  | 'gain–swing'
  | 'own saturation'
  | 'switched input'
  | 'crossing'
  | 'output'
  | 'clock input'
  | 'input'
  | 'start-up voltage'
  | 'follower'

/**
 * A stage with a bias current per width J to choose. Supply lines say how many volts J costs; the other lines
 * no supply mends. All voltages in V, currents per width in A/m, frequencies in Hz.
 */
export interface Stage {
  /** Lowest supply at which every supply line holds at J. Rises with J. */
  readonly supplyNeeded: (J: number, t: Trace) => number
  /** The supply line that asks for the most at J. */
  readonly bindingAt: (J: number) => Line
  /** Swing that the gain asks for at J, where gain and swing are tied. */
  readonly swingNeeded?: (J: number, t: Trace) => number
  /** Volts to spare in the line that tightens with J and that no supply mends (gain–swing). */
  readonly swingSpare: (J: number) => number
  /** Volts to spare in the line that relaxes with J (own saturation). */
  readonly ownSpare: (J: number) => number
  /** Swing of the gain–swing line and that of own saturation, for their margins [V]. */
  readonly gainSwing: number
  readonly ownSwing: number
  /** The device speed the stage has at J. */
  readonly speed: (J: number, t: Trace) => number
  /** Smallest J looked at: deep weak inversion. */
  readonly J_low: number
  /** Largest admissible J. */
  readonly J_lim: number
  /** Floor of the saturation voltage in thermal voltages that its lines take; absent for that of gain devices. */
  readonly c_sat?: number
  /** Numbers the residuals rest on, for the derivation. */
  readonly givens: Readonly<Record<string, number>>
}

/** The interval of J that every line allows whatever the supply. */
export interface Window {
  readonly J_from: number
  readonly J_to: number
  /** Which line ends the interval above. */
  readonly endedBy: Line
  /** Set when no J will do: available over needed swing, below 1. */
  readonly impossible?: number
}

/** No line of this kind: always enough. */
export const NO_LINE = (): number => Number.POSITIVE_INFINITY

/** Where J may lie whatever the supply: density and gain–swing above, own saturation below. */
export function windowOf(stage: Stage, root: RootIn): Window {
  const { J_low, J_lim, swingSpare, ownSpare, ownSwing, gainSwing } = stage
  if (swingSpare(J_low) < 0) {
    return {
      J_from: J_low,
      J_to: J_low,
      endedBy: 'gain–swing',
      impossible: gainSwing / (gainSwing - swingSpare(J_low)),
    }
  }
  const swingLimited = swingSpare(J_lim) < 0
  const J_to = swingLimited ? root(swingSpare, J_low, J_lim) : J_lim
  const endedBy: Line = swingLimited ? 'gain–swing' : 'density'
  if (ownSpare(J_low) >= 0) return { J_from: J_low, J_to, endedBy }
  if (ownSpare(J_to) < 0) {
    return {
      J_from: J_to,
      J_to,
      endedBy: 'own saturation',
      impossible: Math.max(0, 1 + ownSpare(J_to) / ownSwing),
    }
  }
  return { J_from: root(ownSpare, J_low, J_to), J_to, endedBy }
}

/** Root of a function of J between two values of J, found in √J. */
export type RootIn = (f: (J: number) => number, J_a: number, J_b: number) => number
