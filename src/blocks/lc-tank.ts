import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { chargeAt } from '../device/charge.ts'
import { gateCapacitanceAt, laidOutCapacitance } from '../device/speed.ts'
import { offCapacitance, onResistanceAt, switchFrequency } from '../device/switch.ts'
import type { Settings } from '../scenario/keys/index.ts'
import type { Bench } from './bench.ts'

/** The tank of an LC oscillator: what it must cover, what its switched bank reaches, how good it is. */

export type Oscillator = NonNullable<Settings['oscillator']>

const TANK = 'circuit theory'
const DERIVED = 'derived: shares of the tank capacitance at the highest frequency'

/** x = (f_max/f_min)^(1/N_core): each core covers an equal ratio. f_max [Hz], f_min [Hz], N_core [1] → [1]. */
export const coreRatio = formula(
  { symbol: 'x', meaning: 'frequency ratio that each core covers', unit: '1', source: 'definition' },
  (f_max, f_min, N_core) => (f_max / f_min) ** (1 / N_core),
)

/** f_lo = f_max/x: low end of the core with the highest f_max. f_max [Hz], x [1] → [Hz]. */
export const coreLowEnd = formula(
  {
    symbol: 'f_lo',
    meaning: 'low end of the core that has the highest frequency',
    unit: 'Hz',
    source: 'definition',
  },
  (f_max, x) => f_max / x,
)

/** K = [x (1 + g)²]²: capacitance ratio that the range needs, reserve at both ends. x [1], g [1] → [1]. */
export const neededRatio = formula(
  {
    symbol: 'K',
    meaning: 'ratio of largest to smallest tank capacitance that the range needs',
    unit: '1',
    source: 'f = 1/(2π√(LC))',
  },
  (x, g) => (x * (1 + g) ** 2) ** 2,
)

/** TR = 2(x − 1)/(x + 1): tuning range over the centre. x [1] ratio of the ends → [1]. */
export const tuningRange = formula(
  { symbol: 'TR', meaning: 'tuning range over its centre', unit: '1', source: 'definition' },
  (x) => (2 * (x - 1)) / (x + 1),
)

/** L_d = X_L/(2π f_max). X_L [Ω] differential reactance at f_max, f_max [Hz] → [H]. */
export const tankInductance = formula(
  { symbol: 'L_d', meaning: 'differential tank inductance', unit: 'H', source: 'definition' },
  (X_L, f_max) => X_L / (2 * Math.PI * f_max),
)

/** C_t = 1/[(2πf_max)² L_d]. f_max [Hz], L_d [H] → [F]. */
export const tankCapacitance = formula(
  { symbol: 'C_t', meaning: 'tank capacitance at the highest frequency', unit: 'F', source: TANK },
  (f_max, L_d) => 1 / ((2 * Math.PI * f_max) ** 2 * L_d),
)

/** R_p = Q_t 2πf L_d. Q_t [1], f [Hz], L_d [H] → [Ω]. */
export const tankResistance = formula(
  { symbol: 'R_p', meaning: 'parallel resistance of the tank', unit: 'ohm', source: TANK },
  (Q_t, f, L_d) => Q_t * 2 * Math.PI * f * L_d,
)

/** ρ = C_on/C_off = 1 + 2 f_sw/(Q_b f_max). f_sw [Hz] of the switch, Q_b [1] of the bank at f_max, f_max [Hz] → [1]. */
export const bankRatio = formula(
  {
    symbol: 'rho',
    meaning: 'capacitance of the bank when on over when off',
    unit: '1',
    source: 'derived: one switch between two capacitors, sized for the stated quality factor',
  },
  (f_sw, Q_b, f_max) => 1 + (2 * f_sw) / (Q_b * f_max),
)

/** C_max/C_min = s_f + (1 − s_f) ρ; 1/s_f, below 1, when what is fixed overloads the tank. s_f [1] fixed share, rho [1] → [1]. */
export const reachableRatio = formula(
  {
    symbol: 'K_reach',
    meaning: 'ratio of largest to smallest tank capacitance that can be reached',
    unit: '1',
    source: DERIVED,
  },
  (s_f, rho) => (s_f < 1 ? s_f + (1 - s_f) * rho : 1 / s_f),
)

/** s_f,max = (ρ − K)/(ρ − 1): the fixed share that leaves just enough bank. rho [1] > 1, K [1] → [1]; below 0 when the bank alone is too weak. */
export const largestFixedShare = formula(
  { symbol: 's_f_max', meaning: 'largest fixed share that the range allows', unit: '1', source: DERIVED },
  (rho, K) => (rho - K) / (rho - 1),
)

/** s_0 = s_load + s_wire. s_load [1], s_wire [1] → [1]. */
export const parasiticShare = formula(
  { symbol: 's_0', meaning: 'share of buffers and wiring', unit: '1', source: DERIVED },
  (s_load, s_wire) => s_load + s_wire,
)

/** 1/Q_t = x/Q_L + (1 − s_f/x²)/(Q_b x) at f_max/x: Q_L ∝ f, Q_b ∝ 1/f. x [1], Q_L [1], Q_b [1] at f_max, s_f [1] → [1]. */
export const qualityAtLowEnd = formula(
  { symbol: 'Q_lo', meaning: 'quality factor of the tank at its low end', unit: '1', source: TANK },
  (x, Q_L, Q_b, s_f) => 1 / (x / Q_L + Math.max(0, 1 - s_f / x ** 2) / (Q_b * x)),
)

/** 1/Q_t = 1/Q_L + (1 − s_f)/Q_b at f_max. Q_L [1], Q_b [1], s_f [1] → [1]. */
export const qualityAtHighEnd = formula(
  { symbol: 'Q_hi', meaning: 'quality factor of the tank at its high end', unit: '1', source: TANK },
  (Q_L, Q_b, s_f) => 1 / (1 / Q_L + Math.max(0, 1 - s_f) / Q_b),
)

/** Reach of a tank, before its cross-coupled pair is known. SI. */
export interface Tank {
  readonly oscillator: Oscillator
  readonly f_max: number
  readonly f_lo: number
  readonly x: number
  /** Needed capacitance ratio, and that of the bank. */
  readonly K: number
  readonly rho: number
  /** Share of buffers and wiring. */
  readonly s_0: number
  readonly L_d: number
  /** Quality factor of the inductor at the highest frequency. */
  readonly Q_L: number
}

/** The tank that the scenario describes, its bank switched by core transistors under the core supply. */
export function tankOf(oscillator: Oscillator, bench: Bench): Tank {
  const { t, node } = bench
  const [f_min, f_max] = oscillator.range
  const x = t.calc(coreRatio, f_max, f_min, oscillator.cores)
  const f_sw = switchSpeed(bench)
  return {
    oscillator,
    f_max,
    f_lo: t.calc(coreLowEnd, f_max, x),
    x,
    K: t.calc(neededRatio, x, oscillator.overlap),
    rho: t.calc(bankRatio, f_sw, oscillator.bank_q, f_max),
    s_0: t.calc(parasiticShare, oscillator.load_share, oscillator.wire_share),
    L_d: t.calc(tankInductance, oscillator.tank_reactance, f_max),
    Q_L: oscillator.inductor_q ?? node.inductor_q,
  }
}

/**
 * Cut-off frequency [Hz] of the bank's nMOS switch, its channel at ground and its gate at the core supply. Its
 * drain capacitance is the drain share of the gate capacitance at the largest admissible current per width.
 */
export function switchSpeed({
  nmos,
  node,
  V_core,
  t,
}: Pick<Bench, 'nmos' | 'node' | 'V_core' | 't'>): number {
  const C_gg = gateCapacitanceAt(nmos, chargeAt(nmos, nmos.J_lim, t).q_s, t)
  const C_eff = t.calc(laidOutCapacitance, C_gg, nmos.of.C_lay)
  const C_off = t.calc(offCapacitance, node.shares.d, C_eff)
  return t.calc(switchFrequency, onResistanceAt(nmos, V_core, t), C_off)
}

/** Quality factor of the tank at the low end of its core when s_f of the capacitance is fixed [1]. */
export function lowEndQuality(tank: Tank, s_f: number, t: Trace): number {
  const { oscillator, x, Q_L } = tank
  return oscillator.tank_q ?? t.calc(qualityAtLowEnd, x, Q_L, oscillator.bank_q, s_f)
}

/** Quality factor of the tank at its highest frequency when s_f of the capacitance is fixed [1]. */
export function highEndQuality(tank: Tank, s_f: number, t: Trace): number {
  const { oscillator, Q_L } = tank
  return oscillator.tank_q ?? t.calc(qualityAtHighEnd, Q_L, oscillator.bank_q, s_f)
}

/** Published single tanks cover about this much of their centre: 45 % below 6 GHz, 25 % above 20 GHz. */
const WIDE = { range: 0.45, to: 6e9 }
const NARROW = { range: 0.25, from: 20e9 }

/** A remark when a core must cover more than published single tanks do; linear in ln f between 6 and 20 GHz. */
export function beyondPublished({ x, f_max }: Tank): string | undefined {
  const share = Math.log(f_max / WIDE.to) / Math.log(NARROW.from / WIDE.to)
  const usual = WIDE.range + (NARROW.range - WIDE.range) * Math.min(1, Math.max(0, share))
  const asked = tuningRange.run(x)
  if (asked <= usual) return undefined
  const percent = (ratio: number): string => `${Math.round(100 * ratio)} %`
  return `${percent(asked)} for one tank is beyond published silicon (about ${percent(usual)} here): two cores or a mode-switched tank`
}
