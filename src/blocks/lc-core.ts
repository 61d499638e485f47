import { formula } from '../derivation/formula.ts'
import type { Bench } from './bench.ts'
import {
  amplitudePlanned,
  complementaryCurrentForAmplitude,
  currentForAmplitude,
  statedAmplitude,
} from './lc-amplitude.ts'
import { fixedShareAt, type LcOscillator, sideEfficiency, startUpTransconductance } from './lc-start-up.ts'
import { lowEndQuality, tankResistance } from './lc-tank.ts'

/** What the core of an LC oscillator swings and draws at its design point. */

/** I = 2 g_m/(g_m/I_D): both sides at start-up. g_m_start [S], gm_ID [1/V] → [A]. */
export const startUpCurrent = formula(
  { symbol: 'I_start', meaning: 'current that starts the oscillator', unit: 'A', source: 'definition' },
  (g_m_start, gm_ID) => (2 * g_m_start) / gm_ID,
)

/** The larger of two currents. I_start [A], I_swing [A] → [A]. */
export const coreCurrent = formula(
  {
    symbol: 'I_osc',
    meaning: 'supply current of the core: what starts it, or what holds its amplitude at the low end',
    unit: 'A',
    source: 'definition',
  },
  (I_start, I_swing) => Math.max(I_start, I_swing),
)

/** Core of an LC oscillator at current per width J. SI. */
export interface LcCore {
  /** Fixed share of the tank capacitance, and quality factor at the low end. */
  readonly s_f: number
  readonly Q_lo: number
  /** Differential peak amplitude. */
  readonly V0: number
  readonly I_start: number
  /** Supply current: stated, or what starts the core and holds its amplitude at the low end. */
  readonly I: number
}

/** Amplitude and current of the core at current per width J [A/m]. */
export function coreAt(state: LcOscillator, J: number, bench: Bench): LcCore {
  const { t } = bench
  const { tank, demand, speed, nmos, pmos } = state
  const { amplitude, current, startup_gain } = tank.oscillator
  const s_f = fixedShareAt(tank, demand.kappa, speed.stage.speed(J, t), t)
  const Q_lo = lowEndQuality(tank, s_f, t)
  const R_lo = t.calc(tankResistance, Q_lo, tank.f_lo, tank.L_d)
  const stated = amplitude !== null || current !== null
  const V0 = stated ? statedAmplitude(state, J, bench) : amplitudePlanned(state, bench)
  const law = pmos === null ? currentForAmplitude : complementaryCurrentForAmplitude
  const g_m = t.calc(startUpTransconductance, startup_gain, Q_lo, tank.f_lo, tank.L_d)
  const I_start = t.calc(startUpCurrent, g_m, sideEfficiency(nmos, pmos, J, t))
  const I = current ?? t.calc(coreCurrent, I_start, t.calc(law, V0, R_lo))
  return { s_f, Q_lo, V0, I_start, I }
}
