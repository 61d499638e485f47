import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import type { DeviceHere } from './conditions.ts'

const EKV =
  'C. Enz, F. Chicco, A. Pezzotta, Nanoscale MOSFET modeling, IEEE Solid-State Circuits Magazine 9(3) and 9(4), 2017'

/** IC = J L/I_spec□. J [A/m] current per width, L [m], I_spec [A] → [1]: 0.1 weak, 1 moderate, 10 strong inversion. */
export const inversionCoefficient = formula(
  { symbol: 'IC', meaning: 'inversion coefficient', unit: '1', source: EKV },
  (J, L, I_spec) => (J * L) / I_spec,
)

/** q_s = [√(4 IC + (1 + λ IC)²) − 1]/2. IC [1] > 0, lambda [1] ≥ 0 → [1]. */
export const sourceCharge = formula(
  { symbol: 'q_s', meaning: 'normalised inversion charge at the source', unit: '1', source: EKV },
  (IC, lambda) => (Math.sqrt(4 * IC + (1 + lambda * IC) ** 2) - 1) / 2,
)

/** Inverse of the above: λ² IC² + (4 + 2 λ) IC − 4 q_s (q_s + 1) = 0. q_s [1], lambda [1] → [1]. */
export const inversionOfCharge = formula(
  { symbol: 'IC', meaning: 'inversion coefficient that carries this charge', unit: '1', source: EKV },
  (q_s, lambda) =>
    (8 * q_s * (q_s + 1)) /
    (4 + 2 * lambda + Math.sqrt((4 + 2 * lambda) ** 2 + 16 * lambda ** 2 * q_s * (q_s + 1))),
)

/** J = IC I_spec□/L. IC [1], I_spec [A], L [m] → [A/m]. */
export const currentDensity = formula(
  { symbol: 'J', meaning: 'current per width', unit: 'A/m', source: EKV },
  (IC, I_spec, L) => (IC * I_spec) / L,
)

/** Inversion coefficient IC [1] and normalised source charge q_s [1]. */
export interface Charge {
  readonly IC: number
  readonly q_s: number
}

/**
 * Source charge of a transistor that carries J per width.
 *
 * @param device the transistor at its operating point
 * @param J current per width [A/m], above zero
 * @param t trace
 * @returns inversion coefficient IC [1] and normalised source charge q_s [1]
 */
export function chargeAt(device: DeviceHere, J: number, t: Trace): Charge {
  const IC = t.calc(inversionCoefficient, J, device.of.L, device.I_spec)
  return { IC, q_s: t.calc(sourceCharge, IC, device.lambda) }
}
