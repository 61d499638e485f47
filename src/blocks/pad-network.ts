import { formula } from '../derivation/formula.ts'
import type { Given, Trace } from '../derivation/trace.ts'

/** A terminated pad: what its capacitance costs in bandwidth and in reflection. */

const CIRCUIT = 'circuit theory'
const BUILT = 'method of this planner: built from function, not from the node'

/** C_fix = c_ESD I_CDM + C_bump. c_ESD [F/A], I_CDM [A], C_bump [F] → [F]. */
export const fixedCapacitance = formula(
  { symbol: 'C_fix', meaning: 'capacitance of protection and bump', unit: 'F', source: BUILT },
  (c_ESD, I_CDM, C_bump) => c_ESD * I_CDM + C_bump,
)

/** C_device = 0.1 C_fix. C_fix [F] → [F]. */
export const receiverShare = formula(
  {
    symbol: 'C_device',
    meaning: 'input devices and termination of the receiver: a tenth of what is fixed',
    unit: 'F',
    source: 'common practice, no source',
  },
  (C_fix) => 0.1 * C_fix,
)

/** C_pad = C_fix + C_device. C_fix [F], C_device [F] → [F]. */
export const padCapacitance = formula(
  { symbol: 'C_pad', meaning: 'pad capacitance', unit: 'F', source: BUILT },
  (C_fix, C_device) => C_fix + C_device,
)

/** f_pad = x_ext/(2π(R0/2) C_pad). x_ext [1] extension, R0 [Ω], C_pad [F] → [Hz]. */
export const padBandwidth = formula(
  { symbol: 'f_pad', meaning: 'bandwidth of the doubly terminated pad', unit: 'Hz', source: CIRCUIT },
  (x_ext, R0, C_pad) => x_ext / (2 * Math.PI * (R0 / 2) * C_pad),
)

type Extension = 'none' | 'T-coil' | 'split-2' | 'split-3' | 'split-4'
const extension = (meaning: string, source: string, value: number): Given & { readonly value: number } => ({
  symbol: 'x_ext',
  meaning,
  unit: '1',
  source,
  value,
})
const T_COIL =
  'D. L. Feucht, Handbook of Analog Circuit Design, 1990; B. Razavi, The bridged T-coil, IEEE Solid-State Circuits Magazine 7(4), 2015'
const LADDER = 'derived: doubly terminated Butterworth ladder of the same total capacitance'

/** Bandwidth over that of the lumped pole. */
const EXTENSION: Readonly<Record<Extension, Given & { readonly value: number }>> = {
  none: extension('no bandwidth extension', 'definition', 1),
  'T-coil': extension('bridged T-coil, at its best 1.41', T_COIL, 1.41),
  'split-2': extension('capacitance split over two nodes of a ladder', LADDER, 1),
  'split-3': extension('capacitance split over three nodes of a ladder', LADDER, 1.62),
  'split-4': extension('capacitance split over four nodes of a ladder', LADDER, 2.25),
}

/** Bandwidth extension of a kind of pad network over its lumped pole [1], written down as a given value. */
export function extensionFactor(kind: Extension, t: Trace): number {
  return t.leaf(EXTENSION[kind], EXTENSION[kind].value)
}

/** R_low = R0(1 − tol_R). R0 [Ω], tol_R [1] → [Ω]. */
export const lowTermination = formula(
  {
    symbol: 'R_t',
    meaning: 'termination at the low end of its tolerance',
    unit: 'ohm',
    source: 'definition',
  },
  (R0, tol_R) => R0 * (1 - tol_R),
)

/** R_high = R0(1 + tol_R). R0 [Ω], tol_R [1] → [Ω]. */
export const highTermination = formula(
  {
    symbol: 'R_t',
    meaning: 'termination at the high end of its tolerance',
    unit: 'ohm',
    source: 'definition',
  },
  (R0, tol_R) => R0 * (1 + tol_R),
)

/** C_seen = C_pad/x_ext. C_pad [F], x_ext [1] → [F]. */
export const seenCapacitance = formula(
  {
    symbol: 'C_seen',
    meaning: 'capacitance that the line sees behind the extension',
    unit: 'F',
    source: 'estimate: a network that widens the pole reflects like a pad as much smaller',
  },
  (C_pad, x_ext) => C_pad / x_ext,
)

/** RL = −10 lg{[(R_t − R0)² + (2πf R_t R0 C)²]/[(R_t + R0)² + (2πf R_t R0 C)²]}. R_t [Ω], R0 [Ω], f_RL [Hz], C_seen [F] → [dB]. */
export const returnLoss = formula(
  { symbol: 'RL', meaning: 'return loss of the terminated pad', unit: 'dB', source: CIRCUIT },
  (R_t, R0, f_RL, C_seen) =>
    -10 *
    Math.log10(
      ((R_t - R0) ** 2 + (2 * Math.PI * f_RL * R_t * R0 * C_seen) ** 2) /
        ((R_t + R0) ** 2 + (2 * Math.PI * f_RL * R_t * R0 * C_seen) ** 2),
    ),
)

/** The smaller of both ends. RL_low [dB], RL_high [dB] → [dB]. */
export const worseReturnLoss = formula(
  {
    symbol: 'RL',
    meaning: 'return loss at the worse end of the termination',
    unit: 'dB',
    source: 'definition',
  },
  (RL_low, RL_high) => Math.min(RL_low, RL_high),
)

/** RL_max = (20/ln 10)/(2 B R0 C_pad): the most that any lossless network gives up to B. B [Hz], R0 [Ω], C_pad [F] → [dB]. */
export const bodeFano = formula(
  {
    symbol: 'RL_max',
    meaning: 'largest return loss that any matching network holds from zero to B',
    unit: 'dB',
    source: 'H. W. Bode 1945; R. M. Fano 1950',
  },
  (B, R0, C_pad) => 20 / Math.log(10) / (2 * B * R0 * C_pad),
)

/** Return loss [dB] of a pad at f [Hz], at the worse end of the termination's tolerance. */
export function worstReturnLoss(
  R0: number,
  tol_R: number,
  f: number,
  C_pad: number,
  x_ext: number,
  t: Trace,
): number {
  const C_seen = t.calc(seenCapacitance, C_pad, x_ext)
  const low = t.calc(returnLoss, t.calc(lowTermination, R0, tol_R), R0, f, C_seen)
  const high = t.calc(returnLoss, t.calc(highTermination, R0, tol_R), R0, f, C_seen)
  return t.calc(worseReturnLoss, low, high)
}
