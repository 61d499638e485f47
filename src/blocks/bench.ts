import { formula } from '../derivation/formula.ts'
import type { Trace } from '../derivation/trace.ts'
import { type DeviceHere, deviceAt, type OperatingPoint, typicalPoint } from '../device/conditions.ts'
import { speedAt } from '../device/speed.ts'
import type { DeviceValues, NodeValues } from '../nodes/keys.ts'
import type { Settings } from '../scenario/keys/index.ts'
import type { UserRule } from '../scenario/rule-formula.ts'
import type { Kept } from './kept.ts'
import { type Rates, ratesOf } from './rates.ts'
import type { Watch } from './watch.ts'

/** One case: an option in a node. Nothing in it depends on the operating point. */
export interface Case {
  readonly block: 'link' | 'clock'
  readonly settings: Settings
  readonly node: NodeValues
  readonly rules: Readonly<Partial<Record<string, UserRule>>>
  /** What one evaluation of the case found and need not find again; absent: everything is found anew. */
  readonly kept?: Kept | undefined
  /** Listens to what is read, when the settings tell it. */
  readonly watch?: Watch | undefined
}

/** The supply and the transistor of the stacked stages, or why there is none. */
export type StackSupply =
  | { readonly device: DeviceHere; readonly V: number; readonly V_high: number; readonly missing?: never }
  | { readonly missing: string }

/** A case at one operating point: what every sub-block measures itself on. SI. */
export interface Bench extends Case {
  readonly at: OperatingPoint
  readonly t: Trace
  readonly rates: Rates
  readonly nmos: DeviceHere
  readonly pmos: DeviceHere
  /** Lowest core supply [V]. */
  readonly V_core: number
  /** Stacked stages: device, lowest and highest supply. */
  readonly stack: StackSupply
  readonly guard: number
  /** The node's intrinsic peak f_T (typical, 300 K), what rules of thumb are measured on [Hz]. */
  readonly peak: number
  /** The state that a function prepares from this bench, prepared once however many ask for it. */
  readonly once: <T>(prepare: (bench: Bench) => T) => T
}

/** V = V_nom (1 − tol_V) − V_do − V_ir, at least 0. V_nom [V], tol_V [1], V_do [V] dropout, V_ir [V] wiring → [V]. */
export const lowestSupplyVoltage = formula(
  { symbol: 'V', meaning: 'lowest supply of the case', unit: 'V', source: 'definition' },
  (V_nom, tol_V, V_do, V_ir) => Math.max(0 * V_nom, V_nom * (1 - tol_V) - V_do - V_ir),
)

/** V_core = V_nom (1 − tol_V) − V_ir, at least 0. V_nom [V] core, tol_V [1], V_ir [V] wiring → [V]. */
export const lowestCoreVoltage = formula(
  { symbol: 'V_core', meaning: 'lowest core supply of the case', unit: 'V', source: 'definition' },
  (V_nom, tol_V, V_ir) => Math.max(0 * V_nom, V_nom * (1 - tol_V) - V_ir),
)

/** V_raised = V_nom + V_lift. V_nom [V], V_lift [V] → [V]. */
export const liftedSupply = formula(
  {
    symbol: 'V_nom',
    meaning: 'nominal supply of the stacked stages, lifted',
    unit: 'V',
    source: 'definition',
  },
  (V_nom, V_lift) => V_nom + V_lift,
)

/** V_high = V_nom (1 + tol_V). V_nom [V], tol_V [1] → [V]. */
export const highestSupplyVoltage = formula(
  { symbol: 'V_high', meaning: 'highest supply of the case', unit: 'V', source: 'definition' },
  (V_nom, tol_V) => V_nom * (1 + tol_V),
)

/**
 * Sets a case up at one operating point.
 *
 * @param given option and node, SI
 * @param at corner, temperature [K], shifts [V], supply tolerance [1]
 * @param t trace
 */
export function benchAt(given: Case, at: OperatingPoint, t: Trace): Bench {
  const { settings, node } = given
  const nmos = deviceAt(node.nmos, at, t)
  const V_core = t.calc(
    lowestCoreVoltage,
    settings.supply.core_voltage ?? node.supply.core,
    at.tol_V,
    settings.supply.ir_drop,
  )
  // Field by field and always the same ones: benches of one shape are what makes the hot path fast.
  const bench: Bench = {
    block: given.block,
    settings,
    node,
    rules: given.rules,
    kept: given.kept,
    watch: given.watch,
    at,
    t,
    rates: ratesOf(given, t),
    nmos,
    pmos: deviceAt(node.pmos, at, t),
    V_core,
    stack: stackSupply(given, at, nmos, t),
    guard: settings.guard,
    peak: peakTransitFrequency(node, t),
    once: (prepare) => once(prepare),
  }
  const once = onceOf(bench)
  return bench
}

/** Prepares each state once; whoever uses it counts as reading what it was prepared from. */
function onceOf(bench: Bench): Bench['once'] {
  const { watch } = bench
  const states = new Map<unknown, { readonly value: unknown; readonly read: ReadonlySet<string> }>()
  return <T>(prepare: (bench: Bench) => T): T => {
    const known = states.get(prepare)
    if (known !== undefined) {
      watch?.add(known.read)
      return known.value as T
    }
    const found =
      watch === undefined ? { value: prepare(bench), read: NOTHING } : watch.during(() => prepare(bench))
    states.set(prepare, found)
    return found.value
  }
}

const NOTHING: ReadonlySet<string> = new Set()

function stackSupply(given: Case, at: OperatingPoint, nmos: DeviceHere, t: Trace): StackSupply {
  const { settings, node } = given
  const chosen = nominalStackSupply(settings, node)
  if ('missing' in chosen) return chosen
  const { regulator_dropout, ir_drop, lift } = settings.supply
  const V_nom = lift === null ? chosen.V_unlifted : t.calc(liftedSupply, chosen.V_unlifted, lift)
  return {
    device: chosen.device === node.nmos ? nmos : deviceAt(chosen.device, at, t),
    V: t.calc(lowestSupplyVoltage, V_nom, at.tol_V, regulator_dropout, ir_drop),
    V_high: t.calc(highestSupplyVoltage, V_nom, at.tol_V),
  }
}

/** The supply that the stacked stages use before any lift, their transistor, and the nominal supply with the lift. */
export interface NominalSupply {
  readonly V_unlifted: number
  readonly V_nom: number
  readonly device: DeviceValues
}

/** Which supply and which transistor the stacked stages use, or why they have none. */
export function nominalStackSupply(
  settings: Settings,
  node: NodeValues,
): NominalSupply | { readonly missing: string } {
  const chosen = unliftedSupply(settings, node)
  if ('missing' in chosen) return chosen
  const { V_unlifted, device } = chosen
  return { V_unlifted, V_nom: V_unlifted + (settings.supply.lift ?? 0), device }
}

function unliftedSupply(
  settings: Settings,
  node: NodeValues,
): Omit<NominalSupply, 'V_nom'> | { readonly missing: string } {
  const { use, voltage, core_voltage } = settings.supply
  const core = core_voltage ?? node.supply.core
  if (use === 'io') {
    if (node.thick === null) return { missing: 'the node states no thick-oxide device for the io supply' }
    const V_unlifted = voltage ?? node.supply.io
    return V_unlifted === null
      ? { missing: 'the node states no io supply' }
      : { V_unlifted, device: node.thick }
  }
  if (use === 'analogue' && voltage === null && node.supply.analogue === null) {
    return { missing: 'the node offers no analogue supply and the scenario states no voltage' }
  }
  if (use === 'core') return { V_unlifted: voltage ?? core, device: node.nmos }
  return { V_unlifted: voltage ?? node.supply.analogue ?? core, device: node.nmos }
}

/** J_best = min(J_peak, J_max). J_peak [A/m], J_max [A/m] → [A/m]. */
export const bestDensity = formula(
  {
    symbol: 'J_best',
    meaning: 'current per width at the published peak, inside the admissible one',
    unit: 'A/m',
    source: 'the modelled f_T has no roll-off at high current, so the published density of the peak is taken',
  },
  (J_peak, J_max) => Math.min(J_peak, J_max),
)

/**
 * The node's intrinsic peak f_T: typical corner, 300 K, blind to headroom. What rules of thumb are measured on.
 *
 * @returns f_T,int [Hz] at the smaller of the published peak density and J_max
 */
export function peakTransitFrequency(node: NodeValues, t: Trace): number {
  const device = deviceAt(node.nmos, TYPICAL_300K, t)
  return speedAt(device, t.calc(bestDensity, node.nmos.J_peak, node.nmos.J_max), t).f_T_int
}

const TYPICAL_300K = typicalPoint(300)
