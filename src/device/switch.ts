import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { bracketedRoot } from '../numeric/root.ts'
import type { DeviceHere } from './conditions.ts'

const EKV =
  'C. Enz, F. Chicco, A. Pezzotta, Nanoscale MOSFET modeling, IEEE Solid-State Circuits Magazine 9(3) and 9(4), 2017'

/** R_on W = L U_T/(I_spec□ q) + 2 R_s. L [m], U_T [V], I_spec [A], q [1], R_s [Ω m] → [Ω m]. */
export const onResistance = formula(
  { symbol: 'R_on', meaning: 'on-resistance times width of a switch', unit: 'ohm*m', source: EKV },
  (L, U_T, I_spec, q, R_s) => (L * U_T) / (I_spec * q) + 2 * R_s,
)

/** V_od = V_gate − V_T: overdrive of a switch, its channel at the bulk potential. V_gate [V], V_T [V] → [V]. */
export const switchOverdrive = formula(
  { symbol: 'V_od', meaning: 'gate voltage of the switch above threshold', unit: 'V', source: 'definition' },
  (V_gate, V_T) => V_gate - V_T,
)

/** C_off = d C_eff, per width. d [1] drain share, C_eff [F/m] → [F/m]. */
export const offCapacitance = formula(
  {
    symbol: 'C_off',
    meaning: 'capacitance per width of a switch that is off',
    unit: 'F/m',
    source: 'derived: drain share of the capacitance as laid out',
  },
  (d, C_eff) => d * C_eff,
)

/** f_sw = 1/(2π R_on C_off). R_on [Ω m], C_off [F/m] → [Hz]. */
export const switchFrequency = formula(
  { symbol: 'f_sw', meaning: 'cut-off frequency of a switch', unit: 'Hz', source: 'definition' },
  (R_on, C_off) => 1 / (2 * Math.PI * R_on * C_off),
)

/**
 * On-resistance times width of a switch in the triode region, from 2 q + ln q = (V_gate − V_T)/(n U_T).
 *
 * @param device the transistor at its operating point
 * @param V_gate gate voltage above the channel [V]
 * @param t trace
 * @returns R_on W [Ω m]
 */
export function onResistanceAt(device: DeviceHere, V_gate: number, t: Trace): number {
  const { n, L, R_s } = device.of
  const V_od = t.calc(switchOverdrive, V_gate, device.V_T)
  const reduced = V_od / (n * device.U_T)
  const root = Math.exp(
    bracketedRoot(
      (x) => 2 * Math.exp(x) + x - reduced,
      Math.min(-1, reduced - 1),
      Math.max(1, Math.log(Math.max(1, reduced))),
      1e-12,
    ),
  )
  const q = t.search(
    {
      symbol: 'q',
      meaning: 'normalised channel charge of the switch',
      unit: '1',
      source: EKV,
      residual: '2 q + ln q - V_od/(n U_T)',
      tolerance: '1e-12 relative in ln q',
    },
    root,
    t.recording ? { V_od, n, U_T: device.U_T } : undefined,
  )
  return t.calc(onResistance, L, device.U_T, device.I_spec, q, R_s)
}
