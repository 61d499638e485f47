import type { Bench } from '../../blocks/bench.ts'
import { designDensity, notedDesignDensity } from '../../blocks/design-point.ts'
import {
  amplitudeOfCurrent,
  amplitudeRoom,
  complementaryAmplitudeOfCurrent,
} from '../../blocks/lc-amplitude.ts'
import { coreAt, type LcCore } from '../../blocks/lc-core.ts'
import type { LcOscillator } from '../../blocks/lc-start-up.ts'
import { qualityAtLowEnd, tankInductance, tankResistance } from '../../blocks/lc-tank.ts'
import { formula } from '../../derivation/formula.ts'
import { PLAIN, type Trace } from '../../derivation/trace.ts'
import { BOLTZMANN } from '../../device/conditions.ts'
import {
  complementaryNoiseFactor,
  credibleNoise,
  farNoise,
  flickerCornerOf,
  leastTankNoise,
  meanNoise,
  noiseFactor,
  oscillatorPower,
  taillessNoiseFactor,
  tailTransconductance,
  tankNoise,
  tankPower,
} from './leeson.ts'

/** What an oscillator adds to phase, as densities at its own frequency. SI. */
export interface OscillatorNoise {
  /** Frequency at which it is taken. */
  readonly f_0: number
  /** Far from the carrier [1/Hz]; 0 where the model has no floor. */
  readonly h_0: number
  /** Times the offset squared [Hz]. */
  readonly h_2: number
  /** Corner of flicker noise [Hz]. */
  readonly f_fl: number
  /** Power of the core [W] and its current [A]. */
  readonly power: number
  readonly current: number
}

/** y = (f_max/f_0)/x^j: how far the frequency lies below the top of its core. f_max [Hz], f_0 [Hz], x [1], j_core [1] → [1]. */
export const belowTop = formula(
  {
    symbol: 'y',
    meaning: 'top of the core over the frequency',
    unit: '1',
    source: 'definition: cores of equal ratio tile the range',
  },
  (f_max, f_0, x, j_core) => f_max / f_0 / x ** j_core,
)

/** f_top = f_0 y. f_0 [Hz], y [1] → [Hz]. */
export const coreTop = formula(
  { symbol: 'f_top', meaning: 'highest frequency of the core in use', unit: 'Hz', source: 'definition' },
  (f_0, y) => f_0 * y,
)

/** V_dc = V_tail + V − V_need: the tail has what the pair leaves. V_tail [V], V [V], V_need [V] → [V]. */
export const tailRoom = formula(
  {
    symbol: 'V_dc',
    meaning: 'voltage across the tail, and the overdrive it is given',
    unit: 'V',
    source: 'circuit theory: what supply and pair leave',
  },
  (V_tail, V, V_need) => V_tail + Math.max(0 * V, V - V_need),
)

/** V0 = min(V0, V0_I): an amplitude stated beside a current that does not reach it. V0 [V], V0_I [V] → [V]. */
export const reachedAmplitude = formula(
  { symbol: 'V0', meaning: 'amplitude that the stated current reaches', unit: 'V', source: 'definition' },
  (V0, V0_I) => Math.min(V0, V0_I),
)

const CORE = {
  symbol: 'j_core',
  meaning: 'cores above the one in use',
  unit: '1',
  source: 'definition',
  path: 'oscillator.cores',
}

/** How many cores lie above the one that holds a frequency [Hz]. */
function coresAbove(f_max: number, f_0: number, x: number, cores: number): number {
  if (x <= 1) return 0
  return Math.min(cores - 1, Math.max(0, Math.floor(Math.log(f_max / f_0) / Math.log(x) - 1e-9)))
}

/**
 * Noise of an LC oscillator at its design point, the smallest current per width that gives its speed with the guard.
 *
 * @param state the oscillator; it must have an operating point
 * @param f_0 frequency in use [Hz]
 * @param bench the case at its operating point
 */
export function lcNoiseAt(state: LcOscillator, f_0: number, bench: Bench): OscillatorNoise {
  const { t, at, node } = bench
  const { tank, speed } = state
  const { oscillator } = tank
  const J = notedDesignDensity(speed, bench.guard, t)!
  const core = coreAt(state, J, bench)
  const { Q, R_p } = tankAt(state, core, f_0, t)
  const V0 = amplitudeAt(state, core, R_p, bench)
  const V_dc = t.calc(tailRoom, state.V_S, speed.V, speed.stage.supplyNeeded(J, t))
  const gamma = pairNoise(state, bench)
  const F = factorOf(state, core.I, R_p, V_dc, gamma, t)
  const P_s = t.calc(tankPower, V0, R_p)
  const h_0 = t.calc(farNoise, F, BOLTZMANN.value, at.T, P_s)
  const power = t.calc(oscillatorPower, speed.V, core.I)
  const h_2 = t.calc(
    credibleNoise,
    t.calc(tankNoise, h_0, f_0, Q),
    t.calc(leastTankNoise, gamma, BOLTZMANN.value, at.T, f_0, power, Q),
  )
  const corner = flickerCornerOf(node.kind ?? 'planar')
  const f_fl = oscillator.flicker_corner ?? t.leaf(corner, corner.value)
  return { f_0, h_0, h_2, f_fl, power, current: core.I }
}

/** Quality factor and parallel resistance of the tank in use at f_0 [Hz]. */
function tankAt(
  { tank }: LcOscillator,
  { s_f }: LcCore,
  f_0: number,
  t: Trace,
): { readonly Q: number; readonly R_p: number } {
  const { oscillator, f_max, x, Q_L } = tank
  const j = t.leaf(CORE, coresAbove(f_max, f_0, x, oscillator.cores))
  const y = t.calc(belowTop, f_max, f_0, x, j)
  const L_d = t.calc(tankInductance, oscillator.tank_reactance, t.calc(coreTop, f_0, y))
  const Q = oscillator.tank_q ?? t.calc(qualityAtLowEnd, y, Q_L, oscillator.bank_q, s_f)
  return { Q, R_p: t.calc(tankResistance, Q, f_0, L_d) }
}

function amplitudeAt(state: LcOscillator, core: LcCore, R_p: number, bench: Bench): number {
  const { t } = bench
  const { amplitude, current } = state.tank.oscillator
  if (current === null) return core.V0
  const law = state.pmos === null ? amplitudeOfCurrent : complementaryAmplitudeOfCurrent
  const reached = t.calc(law, current, R_p, amplitudeRoom(state, bench))
  return amplitude === null ? reached : t.calc(reachedAmplitude, amplitude, reached)
}

function pairNoise({ nmos, pmos }: LcOscillator, { t }: Bench): number {
  return pmos === null ? nmos.of.gamma : t.calc(meanNoise, nmos.of.gamma, pmos.of.gamma)
}

function factorOf(
  { tank, pmos }: LcOscillator,
  I: number,
  R_p: number,
  V_dc: number,
  gamma: number,
  t: Trace,
): number {
  if (tank.oscillator.tail === 'no') return t.calc(taillessNoiseFactor, gamma)
  const g_m = t.calc(tailTransconductance, I, V_dc)
  const law = pmos === null ? noiseFactor : complementaryNoiseFactor
  return t.calc(law, gamma, tank.oscillator.tail_noise, g_m, R_p)
}

/** The end of the range, of the core at its top, at which the oscillator jitters most: noise over frequency squared. */
export function worseEnd(state: LcOscillator, bench: Bench): number {
  const { f_lo, f_max } = state.tank
  if (f_lo === f_max || designDensity(state.speed, bench.guard) === null) return f_max
  const plain = { ...bench, t: PLAIN }
  const jitter = (f: number): number => lcNoiseAt(state, f, plain).h_2 / f ** 2
  return jitter(f_lo) > jitter(f_max) ? f_lo : f_max
}
