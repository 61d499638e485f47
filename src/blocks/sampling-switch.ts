import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { chargeAt } from '../device/charge.ts'
import type { DeviceHere } from '../device/conditions.ts'
import { halfSupply } from '../device/fo4.ts'
import { gateCapacitanceAt, laidOutCapacitance } from '../device/speed.ts'
import { offCapacitance, onResistanceAt, switchFrequency } from '../device/switch.ts'
import type { Bench } from './bench.ts'

/** The sampling switch of a track-and-hold and the capacitor behind it. */

const DRIVE = 'derived: gate over channel, body effect of the raised channel included'

/** V_swing = V_FS/2: single-ended swing of a full-scale signal. V_FS [V] differential peak to peak → [V]. */
export const singleEndedSwing = formula(
  {
    symbol: 'V_swing',
    meaning: 'single-ended swing of a full-scale signal',
    unit: 'V',
    source: 'definition',
  },
  (V_FS) => V_FS / 2,
)

/** V_in = V_need − V_m: the buffer's input at the top of the signal. V_need [V] supply that the buffer needs, V_m [V] reserve → [V]. */
export const highestInput = formula(
  {
    symbol: 'V_in',
    meaning: 'highest single-ended input: common mode and peak that the buffer behind it asks for',
    unit: 'V',
    source: 'derived: the sampled node is the gate of the buffer',
  },
  (V_need, V_m) => V_need - V_m,
)

/** V_gate = V − (n − 1) V_in: boosted above the signal by the supply. V [V], n [1], V_in [V] → [V]. */
export const boostedDrive = formula(
  { symbol: 'V_gate', meaning: 'gate drive of a boosted switch', unit: 'V', source: DRIVE },
  (V, n, V_in) => V - (n - 1) * V_in,
)

/** V_gate = V − n V_in: the gate at the supply. V [V], n [1], V_in [V] → [V]. */
export const plainDrive = formula(
  {
    symbol: 'V_gate',
    meaning: 'gate drive of a switch with its gate at the supply',
    unit: 'V',
    source: DRIVE,
  },
  (V, n, V_in) => V - n * V_in,
)

/** 1/R = 1/R_n + 1/R_p at equal widths. R_n [Ω m], R_p [Ω m] → [Ω m]. */
export const parallelResistance = formula(
  {
    symbol: 'R_on',
    meaning: 'on-resistance times width of both switches together',
    unit: 'ohm*m',
    source: 'circuit theory',
  },
  (R_n, R_p) => 1 / (1 / R_n + 1 / R_p),
)

/** C = C_n + C_p at equal widths. C_n [F/m], C_p [F/m] → [F/m]. */
export const parallelCapacitance = formula(
  {
    symbol: 'C_off',
    meaning: 'capacitance per width of both switches',
    unit: 'F/m',
    source: 'circuit theory',
  },
  (C_n, C_p) => C_n + C_p,
)

/** χ: how large the switch may be against its capacitor. */
export const SWITCH_SHARE = {
  symbol: 'chi',
  meaning: 'capacitance of the switch over the sampling capacitor',
  unit: '1',
  source: 'common practice, no source: at most 0.3',
  value: 0.3,
}

/** f_sw ≥ 1.5 f_N/χ. f_N [Hz], chi [1] → [Hz]. */
export const switchDemand = formula(
  {
    symbol: 'f_sw_req',
    meaning: 'cut-off frequency that the sampling switch needs',
    unit: 'Hz',
    source: 'derived: 1/(2π R_on C_s) ≥ 1.5 f_N with C_off = χ C_s',
  },
  (f_N, chi) => (1.5 * f_N) / chi,
)

/** Off capacitance per width [F/m] of a switch, its charge that of the largest admissible current per width. */
function offAt(device: DeviceHere, d: number, t: Trace): number {
  const C_gg = gateCapacitanceAt(device, chargeAt(device, device.J_lim, t).q_s, t)
  return t.calc(offCapacitance, d, t.calc(laidOutCapacitance, C_gg, device.of.C_lay))
}

/** Cut-off frequency [Hz] of the sampling switch at its highest input V_in [V], the level that the buffer behind it asks for; complementary ones at half the supply. */
export function samplingSwitch({ settings, nmos, pmos, node, V_core, t }: Bench, V_in: number): number {
  const { switch: kind } = settings.receiver.converter
  const { d } = node.shares
  if (kind === 'complementary') {
    const V_half = t.calc(halfSupply, V_core)
    const R_n = onResistanceAt(nmos, t.calc(plainDrive, V_core, nmos.of.n, V_half), t)
    const R_p = onResistanceAt(pmos, t.calc(plainDrive, V_core, pmos.of.n, V_half), t)
    const C_off = t.calc(parallelCapacitance, offAt(nmos, d, t), offAt(pmos, d, t))
    return t.calc(switchFrequency, t.calc(parallelResistance, R_n, R_p), C_off)
  }
  const drive = kind === 'boosted' ? boostedDrive : plainDrive
  const R_on = onResistanceAt(nmos, t.calc(drive, V_core, nmos.of.n, V_in), t)
  return t.calc(switchFrequency, R_on, offAt(nmos, d, t))
}

/** C_kT = 96 k_B T 4^ENOB/V_FS²: differential kT/C noise at a quarter of the quantisation noise. k_B [J/K], T [K], ENOB [1], V_FS [V] → [F]. */
export const noiseCapacitance = formula(
  {
    symbol: 'C_kT',
    meaning: 'sampling capacitance that keeps kT/C noise at a quarter of quantisation noise',
    unit: 'F',
    source: 'derived: 2 kT/C = (V_FS/2^ENOB)²/48',
  },
  (k_B, T, ENOB, V_FS) => (96 * k_B * T * 4 ** ENOB) / V_FS ** 2,
)

export const SUB_INPUT = {
  symbol: 'C_sub',
  meaning: 'input capacitance of each sub-converter',
  unit: 'F',
  source: 'estimate',
  value: 15e-15,
}

/** C_rank = C_sub N_rank. C_sub [F], N_rank [1] → [F]. */
export const rankCapacitance = formula(
  {
    symbol: 'C_rank',
    meaning: 'input capacitance of the sub-converters behind one track-and-hold',
    unit: 'F',
    source: 'estimate',
  },
  (C_sub, N_rank) => C_sub * N_rank,
)

/** C_s = max(C_kT, C_rank). C_kT [F], C_rank [F] → [F]. */
export const samplingCapacitance = formula(
  { symbol: 'C_s', meaning: 'sampling capacitor', unit: 'F', source: 'method of this planner' },
  (C_kT, C_rank) => Math.max(C_kT, C_rank),
)
