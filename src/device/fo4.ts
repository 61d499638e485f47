import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import type { NodeValues } from '../nodes/keys.ts'
import type { DeviceHere } from './conditions.ts'
import { densityAtGateVoltage } from './voltage.ts'

const DELAY =
  'M. H. Na, E. J. Nowak, W. Haensch, J. Cai, The effective drive current in CMOS inverters, IEDM 2002 (form with V_DS left out)'

/** V_half = V/2. V [V] → [V]. */
export const halfSupply = formula(
  {
    symbol: 'V_half',
    meaning: 'half the supply, where an inverter switches',
    unit: 'V',
    source: 'definition',
  },
  (V) => V / 2,
)

/** I_eff = (J_on + J_mid)/2. J_on [A/m] at V_GS = V, J_mid [A/m] at V_GS = V/2 → [A/m]. */
export const effectiveCurrent = formula(
  {
    symbol: 'I_eff',
    meaning: 'current per width that discharges the load of an inverter, averaged over its edge',
    unit: 'A/m',
    source: DELAY,
  },
  (J_on, J_mid) => (J_on + J_mid) / 2,
)

/** FO4_here = FO4 (max(V, U_T)/I_eff)/(V_typ/I_typ): below U_T the drain voltage, not the gate, limits the current. FO4 [s] datum, V [V], U_T [V], I_eff [A/m], I_typ [A/m], V_typ [V] → [s]. */
export const scaledFo4 = formula(
  {
    symbol: 'FO4_here',
    meaning: 'fan-out-of-four delay at this corner, temperature and supply',
    unit: 's',
    source: 'derived: delay C V/I_eff with the same capacitance as at the datum',
  },
  (FO4, V, U_T, I_eff, I_typ, V_typ) => FO4 * (Math.max(V, U_T) / I_eff / (V_typ / I_typ)),
)

const DATUM_SUPPLY = {
  symbol: 'V_typ',
  meaning: 'core supply at which the delay is stated',
  unit: 'V',
  source: 'node file',
  path: 'supply.core',
}

/** Switching current per width [A/m] of an inverter's nMOS under a supply V [V]. */
function switchingCurrent(nmos: DeviceHere, V: number, t: Trace): number {
  const J_on = densityAtGateVoltage(nmos, V, t)
  const J_mid = densityAtGateVoltage(nmos, t.calc(halfSupply, V), t)
  return t.calc(effectiveCurrent, J_on, J_mid)
}

/**
 * Fan-out-of-four delay of a node at any corner, temperature and supply.
 *
 * The node's published delay is the datum and the model only scales it: an absolute C V/(2 I_eff) from the
 * values of the built-in classes comes out 1.0 (90 to 28 nm) to 4 times (3 nm) slower than what is published.
 * Only the nMOS enters: the pMOS of a balanced gate scales alike.
 *
 * @param node its values: `fo4` [s] at typical, 300 K and `supply.core` [V]
 * @param nmos core nMOS at the operating point asked
 * @param nmosTypical core nMOS at the typical corner, 300 K; both devices made with the trace `t`
 * @param V supply [V]
 * @param t trace
 * @returns delay [s]; grows without bound as V falls below the threshold
 */
export function fo4At(
  node: NodeValues,
  nmos: DeviceHere,
  nmosTypical: DeviceHere,
  V: number,
  t: Trace,
): number {
  const I_eff = switchingCurrent(nmos, V, t)
  const V_typ = t.leaf(DATUM_SUPPLY, node.supply.core)
  const I_typ = switchingCurrent(nmosTypical, V_typ, t)
  return t.calc(scaledFo4, node.fo4, V, nmos.U_T, I_eff, I_typ, V_typ)
}
