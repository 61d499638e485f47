import { formula } from '../derivation/formula.ts'
import type { Given, Trace } from '../derivation/trace.ts'

const DERIVED = 'derived: every capacitance at the output node as a share of the intrinsic gate capacitance'
const PEAKED =
  'S. S. Mohan et al., IEEE JSSC 35(3), 2000; S. Shekhar et al., IEEE JSSC 41(11), 2006; recomputed'

/** c_lay = C_lay/C_gg. C_lay [F/m], C_gg [F/m] → [1]. */
export const layoutShare = formula(
  { symbol: 'c_lay', meaning: 'layout over intrinsic gate capacitance', unit: '1', source: 'definition' },
  (C_lay, C_gg) => C_lay / C_gg,
)

/** ℓ = φ(1 + A m + c_lay) + d + w. phi [1] fan-out, A [1] gain, m [1] Miller share, c_lay [1], d [1] drain share, w [1] wire share → [1]. */
export const loadFactor = formula(
  {
    symbol: 'l',
    meaning: 'load of a current-mode stage in its own gate capacitances',
    unit: '1',
    source: DERIVED,
  },
  (phi, A, m, c_lay, d, w) => phi * (1 + A * m + c_lay) + d + w,
)

/** ℓ = φ(1 + A m + c_lay) + n_leg d + w: every leg hangs its drain on the load. phi [1], A [1], m [1], c_lay [1], n_leg [1], d [1], w [1] → [1]. */
export const legsLoad = formula(
  {
    symbol: 'l',
    meaning: 'load of several legs on one node in gate capacitances of one leg',
    unit: '1',
    source: 'derived: as any current-mode stage, with the drains of all legs',
  },
  (phi, A, m, c_lay, n_leg, d, w) => phi * (1 + A * m + c_lay) + n_leg * d + w,
)

/** f_p = β f_T/(A ℓ): pole of a current-mode stage. beta [1], f_T [Hz], A [1], l [1] → [Hz]. */
export const stagePole = formula(
  {
    symbol: 'f_p',
    meaning: 'bandwidth of a current-mode stage',
    unit: 'Hz',
    source: 'derived: gain A = g_m R, f_p = 1/(2πRC)',
  },
  (beta, f_T, A, l) => (beta * f_T) / (A * l),
)

/** f_T ≥ BW A ℓ/β: device speed that puts the pole of a stage at BW. BW [Hz], A [1], l [1], beta [1] → [Hz]. */
export const poleDemand = formula(
  {
    symbol: 'f_T_req',
    meaning: 'device speed that puts the pole of the stage at the bandwidth',
    unit: 'Hz',
    source: 'derived: stage pole β f_T/(A ℓ)',
  },
  (BW, A, l, beta) => (BW * A * l) / beta,
)

/** Kinds of inductive peaking and how far each widens a stage. */
export type Peaking = 'none' | 'shunt-delay' | 'shunt-flat' | 'shunt-bridged'

interface PeakingFactors extends Given {
  readonly widening: number
  /** Bandwidth left of a cascade of 2, 3, 4 like stages over that of one. */
  readonly shrink: readonly [number, number, number]
}

const about = (
  meaning: string,
  widening: number,
  shrink: readonly [number, number, number],
): PeakingFactors => ({
  symbol: 'beta',
  meaning,
  unit: '1',
  source: PEAKED,
  widening,
  shrink,
})

/** Widening β of one stage and the shrinkage of cascades, solved exactly. */
export const PEAKING: Readonly<Record<Peaking, PeakingFactors>> = {
  none: about('no inductive peaking', 1, [0.644, 0.51, 0.435]),
  'shunt-delay': about('shunt peaking for best group delay', 1.57, [0.706, 0.581, 0.507]),
  'shunt-flat': about('maximally flat shunt peaking', 1.72, [0.774, 0.679, 0.622]),
  'shunt-bridged': about('bridged shunt peaking', 1.85, [0.846, 0.774, 0.73]),
}

/** β of a kind of peaking [1], written down as a given value. */
export function peakingFactor(kind: Peaking, t: Trace): number {
  return t.leaf(PEAKING[kind], PEAKING[kind].widening)
}

type Shrinkage = Given & { readonly value: number }

const shrinkRows = (kind: Peaking): readonly Shrinkage[] =>
  [1, ...PEAKING[kind].shrink].map((value, k) => ({
    symbol: 'shrink',
    meaning: `bandwidth of ${k + 1} like stages over that of one (${PEAKING[kind].meaning})`,
    unit: '1',
    source: PEAKED,
    value,
  }))

const SHRINK: Readonly<Record<Peaking, readonly Shrinkage[]>> = {
  none: shrinkRows('none'),
  'shunt-delay': shrinkRows('shunt-delay'),
  'shunt-flat': shrinkRows('shunt-flat'),
  'shunt-bridged': shrinkRows('shunt-bridged'),
}

/**
 * Bandwidth of a cascade of n like linear stages over that of one.
 *
 * @param n stages, 1 to 4
 * @param kind inductive peaking of each
 * @returns f_chain/f_p [1]; 1 for a single stage
 */
export function shrink(n: number, kind: Peaking): number {
  return SHRINK[kind][n - 1]!.value
}

/** As {@link shrink}, written down as a given value. */
export function shrinkFactor(n: number, kind: Peaking, t: Trace): number {
  const row = SHRINK[kind][n - 1]!
  return t.leaf(row, row.value)
}
