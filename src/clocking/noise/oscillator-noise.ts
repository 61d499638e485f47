import type { Bench } from '../../blocks/bench.ts'
import { lcOscillatorAt } from '../../blocks/lc-oscillator.ts'
import { oscillatorFrequency, PHASE_RATIO } from '../../blocks/oscillator-range.ts'
import { derivedRoute } from '../../blocks/stage-speed.ts'
import type { RouteOutcome } from '../../blocks/sub-block.ts'
import { formula } from '../../derivation/formula.ts'
import { BOLTZMANN } from '../../device/conditions.ts'
import { lcNoiseAt, type OscillatorNoise, worseEnd } from './lc-oscillator-noise.ts'
import { oscillatorPower } from './leeson.ts'
import { ringCornerOf, ringCurrent, ringNoise, STAGE_CURRENT } from './ring.ts'

/** Noise of the case's oscillator, why it is unknown, or by how much its supply is too low. */
export type OscillatorFound =
  | { readonly noise: OscillatorNoise }
  | { readonly unknown: string }
  | { readonly short: RouteOutcome & { readonly margin: number }; readonly binding: string }

/** f_0 = min(max(f_osc, f_min), f_max): the lane's frequency, or the end of the range next to it. f_osc [Hz], f_min [Hz], f_max [Hz] → [Hz]. */
export const frequencyInUse = formula(
  { symbol: 'f_0', meaning: 'frequency of the oscillator in use', unit: 'Hz', source: 'definition' },
  (f_osc, f_min, f_max) => Math.min(Math.max(f_osc, f_min), f_max),
)

/** Noise of the oscillator that the case states, at the operating point that its speed check chose. */
export function oscillatorNoise(bench: Bench): OscillatorFound {
  const { oscillator } = bench.settings
  if (oscillator === null) return { unknown: 'the scenario states no oscillator' }
  return oscillator.kind === 'LC' ? ofLc(bench) : ofRing(bench)
}

function ofLc(bench: Bench): OscillatorFound {
  const state = bench.once(lcOscillatorAt)
  if ('unknown' in state) return state
  if (state.speed.capability.J === null) {
    return { short: derivedRoute(state.speed, bench.t), binding: state.speed.capability.binding }
  }
  return { noise: lcNoiseAt(state, statedFrequency(bench) ?? worseEnd(state, bench), bench) }
}

/** The frequency that a lane, or the stated clock of a clock block, asks of the oscillator [Hz]; null when the range is free. */
function statedFrequency({ block, settings, rates, t }: Bench): number | null {
  const [f_min, f_max] = settings.oscillator!.range
  const k_ph = t.leaf(PHASE_RATIO, settings.clock.phases_from === 'divide-by-2' ? 2 : 1)
  const f_osc = t.calc(oscillatorFrequency, k_ph, rates.f_ck)
  if (block === 'link') return t.calc(frequencyInUse, f_osc, f_min, f_max)
  return settings.clock.frequency !== null && f_osc >= f_min && f_osc <= f_max ? f_osc : null
}

function ofRing(bench: Bench): OscillatorFound {
  const { settings, stack, node, at, t, V_core } = bench
  const { kind, stages, current, noise_excess, range, flicker_corner } = settings.oscillator!
  if (kind === 'ring' && stack.missing !== undefined) return { unknown: stack.missing }
  const V = kind === 'ring' && stack.missing === undefined ? stack.V : V_core
  const f_0 = statedFrequency(bench) ?? range[1]
  const I = current ?? t.calc(ringCurrent, stages, t.leaf(STAGE_CURRENT, STAGE_CURRENT.value))
  const power = t.calc(oscillatorPower, V, I)
  const h_2 = t.calc(ringNoise, BOLTZMANN.value, at.T, power, f_0, noise_excess)
  const corner = ringCornerOf(node.kind ?? 'planar')
  const f_fl = flicker_corner ?? t.leaf(corner, corner.value)
  return { noise: { f_0, h_0: 0, h_2, f_fl, power, current: I } }
}
