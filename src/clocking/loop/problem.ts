/** Phase-noise densities of a clock by how they enter the loop, as plain numbers at the oscillator's frequency. */

/** A measured profile: offsets [Hz] and densities [1/Hz]. */
export interface Profile {
  readonly offset: Float64Array
  readonly density: Float64Array
}

/** What enters at the detector and is low-passed: flat, 1/f, modulator, and a measured reference. */
export interface LowSide {
  /** [1/Hz] */
  readonly flat: number
  /** Times 1/f [1]. */
  readonly flicker: number
  /** Coefficient of the modulator's shape [1/Hz]; 0 without one. */
  readonly modulator: number
  readonly order: number
  readonly table: Profile | null
  /** Factor on the table [1]. */
  readonly scale: number
}

/** What the oscillator adds and the loop high-passes: by powers of the offset, and a measured oscillator. */
export interface HighSide {
  readonly flat: number
  readonly flicker: number
  readonly white: number
  readonly flicker3: number
  readonly table: Profile | null
  readonly scale: number
}

export interface LoopProblem {
  readonly kind: 'type-II' | 'realigned'
  readonly f_ref: number
  /** √b [1]. */
  readonly r: number
  /** Whether sampling delays the loop. */
  readonly delayed: boolean
  /** Band of integration [Hz]. */
  readonly f_1: number
  readonly f_2: number
  /** Corner of the receiver's tracking [Hz]; null without. */
  readonly f_CDR: number | null
  readonly low: LowSide
  readonly high: HighSide
  /** Noise of the filter resistor over f_c: density times f² is `filter` · f_c [1]. */
  readonly filter: number
}

/** Every number of a problem, to know it by; tables by their size and sums. */
export function numbersOf(p: LoopProblem): readonly number[] {
  const { low, high } = p
  const known = (table: Profile | null): readonly number[] =>
    table === null
      ? [0]
      : [table.offset.length, sum(table.offset), sum(table.density.map((one) => Math.log(one)))]
  return [
    p.kind === 'type-II' ? 2 : 1,
    p.f_ref,
    p.r,
    p.delayed ? 1 : 0,
    p.f_1,
    p.f_2,
    p.f_CDR ?? -1,
    low.flat,
    low.flicker,
    low.modulator,
    low.order,
    low.scale,
    ...known(low.table),
    high.flat,
    high.flicker,
    high.white,
    high.flicker3,
    high.scale,
    ...known(high.table),
    p.filter,
  ]
}

const sum = (values: Float64Array): number => values.reduce((all, one) => all + one, 0)
