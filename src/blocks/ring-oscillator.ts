import { formula } from '../derivation/formula.ts'
import { marginAtLeast } from '../derivation/margin.ts'
import type { Trace } from '../derivation/trace.ts'
import { deviceAt, typicalPoint } from '../device/conditions.ts'
import { fo4At } from '../device/fo4.ts'
import { gateCapacitanceOf } from '../device/speed.ts'
import { halfDensity, tailVoltage } from '../device/stacks/lines.ts'
import { switchedPair } from '../device/stacks/switched-pair.ts'
import { SWITCH_FLOOR } from '../device/voltage.ts'
import type { Bench, Case } from './bench.ts'
import { coreStressCheck } from './core-stress.ts'
import { deviceResults } from './design-point.ts'
import { layoutShare, loadFactor } from './load.ts'
import { rangeCheck } from './oscillator-range.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import { stageSpeed } from './stage-speed.ts'
import { ASKED, type CheckSpec, notAsked, type Outcome, subBlock, type Unprepared } from './sub-block.ts'

const RING = 'derived: each stage turns the phase by π/N, ω = tan(π/N)/(RC), g_m R ≥ 1/cos(π/N)'

/** A = A_x/cos(π/N): gain of each stage. A_x [1] over the least gain, N [1] stages → [1]. */
export const ringStageGain = formula(
  { symbol: 'A', meaning: 'small-signal gain of each ring stage', unit: '1', source: RING },
  (A_x, N) => A_x / Math.cos(Math.PI / N),
)

/** f_T ≥ f_max ℓ A_x reserve/sin(π/N). f_max [Hz], l [1], A_x [1], reserve [1], N [1] → [Hz]. */
export const ringDemand = formula(
  { symbol: 'f_T_req', meaning: 'device speed that the ring needs', unit: 'Hz', source: RING },
  (f_max, l, A_x, reserve, N) => (f_max * l * A_x * reserve) / Math.sin(Math.PI / N),
)

/** f = 1/(2 N · 0.5 FO4 · 1.5): stages of half a fan-out-of-four delay, half as much again for tuning. N [1], FO4_here [s] → [Hz]. */
export const inverterRingFrequency = formula(
  {
    symbol: 'f_ring',
    meaning: 'highest frequency of a ring of inverters',
    unit: 'Hz',
    source: 'derived: two transits of N stages a period; load and tuning are common practice, no source',
  },
  (N, FO4_here) => 1 / (2 * N * 0.5 * FO4_here * 1.5),
)

/** A ring of current-mode stages as a stack, or one of inverters by its highest frequency [Hz]. */
type Ring = Stacked | { readonly f_ring: number }

const TYPICAL_300K = typicalPoint(300)

function prepare(bench: Bench): Ring | Unprepared {
  const { settings, node, nmos, V_core, t, stack } = bench
  const { kind, stages } = settings.oscillator!
  if (kind === 'CMOS-ring') {
    const delay = fo4At(node, nmos, deviceAt(node.nmos, TYPICAL_300K, t), V_core, t)
    return { f_ring: t.calc(inverterRingFrequency, stages, delay) }
  }
  return stack.missing === undefined ? currentModeRing(bench, stack) : { unknown: stack.missing }
}

function currentModeRing(
  { settings, node, t }: Bench,
  { device, V, V_high }: Exclude<Bench['stack'], { missing: string }>,
): Stacked {
  const { stages: N, gain_excess: A_x, fan_out, reserve, range } = settings.oscillator!
  const f_max = range[1]
  const A = t.calc(ringStageGain, A_x, N)
  const V_sw = settings.headroom.clock_swing
  const V_tail = t.calc(tailVoltage, settings.headroom.tail, device.U_T)
  const stage = switchedPair({
    device,
    V_sw,
    V_sw_in: V_sw,
    A,
    V_m: settings.headroom.reserve,
    V_tail,
    coupling: 'dc',
    clockPairBelow: false,
    c_sat: t.leaf(SWITCH_FLOOR, SWITCH_FLOOR.value),
    ownSaturation: true,
  })
  const demand = (J: number, trace: Trace): number => {
    const C_gg = gateCapacitanceOf(device, trace.calc(halfDensity, J), trace)
    const c_lay = trace.calc(layoutShare, device.of.C_lay, C_gg)
    const { m, d, w } = node.shares
    return trace.calc(ringDemand, f_max, trace.calc(loadFactor, fan_out, A, m, c_lay, d, w), A_x, reserve, N)
  }
  const rule = {
    key: 'ring_oscillator',
    f_op: f_max,
    of: 'f_max',
    k: settings.demand.multiples.ring_oscillator,
    beta: t.leaf(NO_PEAKING, 1),
  }
  return { speed: stageSpeed({ stage, V, rule, demand }, t), V_S: V_tail, V_high }
}

const NO_PEAKING = {
  symbol: 'beta',
  meaning: 'no inductive peaking in a ring',
  unit: '1',
  source: 'definition',
}

function frequencyOutcome(ring: Ring, { settings, t, V_core }: Bench): Outcome {
  const required = settings.oscillator!.range[1]
  const available = 'f_ring' in ring ? ring.f_ring : Number.NaN
  return {
    required,
    available,
    margin: t.calc(marginAtLeast, available, required),
    basis: "fan-out-of-four delay of the node's devices at the lowest core supply",
    supply: V_core,
  }
}

const isCurrentMode = ({ settings }: Case): boolean => settings.oscillator?.kind === 'ring'

const CHECKS: readonly CheckSpec<Ring>[] = [
  ...stackChecks('Ring oscillator').map((check) => ({
    ...check,
    asked: (given: Case) => isCurrentMode(given) && (check.asked?.(given) ?? true),
    evaluate: (ring: Ring, bench: Bench) => check.evaluate(ring as Stacked, bench),
  })),
  {
    name: 'frequency',
    title: 'Ring oscillator: highest frequency',
    quantity: 'oscillation frequency',
    unit: 'Hz',
    sense: 'at least',
    asked: (given) => !isCurrentMode(given),
    evaluate: frequencyOutcome,
  },
  coreStressCheck('Ring oscillator', (given) => !isCurrentMode(given)),
  rangeCheck('Ring oscillator'),
]

/** The ring oscillator, of current-mode stages or of CMOS inverters. */
export const ringOscillator = subBlock<Ring>({
  id: 'ring_oscillator',
  title: 'Ring oscillator',
  of: ['link', 'clock'],
  asked: ({ settings: { oscillator } }) => {
    if (oscillator === null) return notAsked('the scenario states no oscillator')
    return oscillator.kind === 'LC' ? notAsked('the oscillator is an LC tank') : ASKED
  },
  prepare,
  checks: CHECKS,
  results: (ring, bench) => {
    if ('f_ring' in ring) return [{ name: 'ring_oscillator.highest_Hz', value: ring.f_ring, unit: 'Hz' }]
    const { stack } = bench
    return stack.missing === undefined
      ? deviceResults('ring_oscillator', ring.speed, stack.device, 0.5, ring.V_S, bench)
      : []
  },
})
