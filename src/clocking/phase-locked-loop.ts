import type { Bench } from '../blocks/bench.ts'
import { converterNeed } from '../blocks/converter-need.ts'
import {
  ASKED,
  type CheckSpec,
  type NamedResult,
  notAsked,
  type Outcome,
  subBlock,
  type Unprepared,
} from '../blocks/sub-block.ts'
import { apertureAgainst } from '../blocks/track-and-hold.ts'
import { marginAtLeast, marginAtMost } from '../derivation/margin.ts'
import { PLAIN } from '../derivation/trace.ts'
import { quantile } from './budget/allowances.ts'
import { totalJitter } from './budget/dual-dirac.ts'
import { budgetLinesAt } from './budget/lines.ts'
import { ceilingOutcome } from './ceiling.ts'
import { type ClockLoop, clockLoopAt, type NoLoop } from './loop/clock-loop.ts'
import { filterPartsOf } from './loop/filter-parts.ts'
import { flatnessOf } from './loop/flatness.ts'
import { bandwidthToLock, type LockTime, lockTimeOf, lockTimesOf } from './loop/lock.ts'
import { delayedMargin, FULL_TURN } from './loop/shape.ts'
import { levelOf, spectrumOf } from './loop/spectrum.ts'
import { peakingOf } from './loop/transfer.ts'

type State = ClockLoop | Extract<NoLoop, { readonly short: unknown }>

const prepare = (bench: Bench): State | Unprepared => bench.once(clockLoopAt)

/** A loop whose oscillator has no operating point is judged by how much supply that lacks. */
const judged =
  (evaluate: (loop: ClockLoop, bench: Bench) => Outcome) =>
  (state: State, bench: Bench): Outcome =>
    'short' in state ? { ...state.short, basis: state.binding } : evaluate(state, bench)

function bandwidthOutcome({ f_c, f_lim, atLimit }: ClockLoop, { t }: Bench): Outcome {
  const basis = 'a tenth of the reference'
  const margin = t.calc(marginAtMost, f_lim!, f_c)
  const reason =
    margin < 1
      ? 'the sampled loop is not stable with a bandwidth this close to its reference'
      : atLimit === true
        ? 'the best bandwidth lies at the stability limit: a higher reference would lower the jitter'
        : undefined
  return { required: f_lim, available: f_c, margin, basis, ...(reason === undefined ? {} : { reason }) }
}

const LEAST_MARGIN = {
  symbol: 'phi_least',
  meaning: 'least phase margin that a loop is built with',
  unit: 'deg',
  source: 'common practice, no source: 30° leaves 6 dB of peaking',
  value: 30,
}

/** What the delay of sampling leaves of the phase margin. */
function marginOutcome({ f_c, problem }: ClockLoop, { t, settings }: Bench): Outcome {
  const phi_T = t.leaf(FULL_TURN, FULL_TURN.value)
  const available = t.calc(delayedMargin, settings.loop!.phase_margin, f_c, problem.f_ref, phi_T)
  const required = t.leaf(LEAST_MARGIN, LEAST_MARGIN.value)
  return {
    required,
    available,
    margin: t.calc(marginAtLeast, available, required),
    basis: 'designed phase margin less half a reference period of delay',
  }
}

function lockOutcome(loop: ClockLoop, bench: Bench): Outcome {
  const limit = bench.settings.loop!.lock_time!
  const times = lockTimesOf(loop, bench)
  const margin = bench.t.calc(marginAtMost, limit, times.total)
  return {
    required: limit,
    available: times.total,
    margin,
    basis: 'estimate: search among bands, charging of the filter, settling',
    ...(margin < 1 + bench.guard ? { reason: inTime(times, loop, limit) } : {}),
  }
}

/** What bandwidth would lock in time, in words. */
function inTime(times: LockTime, { f_c, f_lim, atLimit }: ClockLoop, limit: number): string {
  if (f_lim === null) return 'the reference sets the bandwidth: a faster one locks sooner'
  const needed = bandwidthToLock(times, f_c, limit)
  if (needed === null)
    return 'the search among bands alone takes that long: fewer bands or a faster reference'
  const chosen = atLimit === false ? 'the bandwidth is the one of least jitter; ' : ''
  const text = `${(needed / 1e6).toPrecision(3)} MHz`
  if (needed > f_lim) return `${chosen}to lock in time takes ${text}, beyond what is stable`
  return `${chosen}${text} locks in time: state it as \`loop.bandwidth\` to see what it costs in jitter`
}

/** All random jitter of the sampling clock against what the converter may have. */
function apertureOutcome(_: ClockLoop, bench: Bench): Outcome {
  const lines = bench.once(budgetLinesAt)
  if ('unknown' in lines) {
    return { required: null, available: null, margin: null, basis: 'not computed', reason: lines.unknown }
  }
  if ('short' in lines) return { ...lines.short, basis: lines.binding }
  return apertureAgainst(converterNeed(bench), lines.sigma_all, bench)
}

const CHECKS: readonly CheckSpec<State>[] = [
  {
    name: 'bandwidth',
    title: 'Loop: bandwidth within the stability limit',
    quantity: 'loop bandwidth',
    unit: 'Hz',
    sense: 'at most',
    asked: ({ settings }) => settings.loop?.kind !== 'realigned',
    evaluate: judged(bandwidthOutcome),
  },
  {
    name: 'phase_margin',
    title: 'Loop: phase margin left by sampling',
    quantity: 'phase margin',
    unit: 'deg',
    sense: 'at least',
    asked: ({ settings }) => settings.loop?.kind !== 'realigned',
    evaluate: judged(marginOutcome),
  },
  {
    name: 'lock_time',
    because: 'the scenario states no lock time',
    title: 'Loop: lock time',
    quantity: 'time to lock',
    unit: 's',
    sense: 'at most',
    asked: ({ settings }) => settings.loop?.lock_time != null,
    evaluate: judged(lockOutcome),
  },
  {
    name: 'aperture',
    title: 'Converter: aperture jitter of the clock',
    quantity: 'full-scale sine over aperture noise',
    unit: 'dB',
    sense: 'at least',
    asked: ({ block, settings: { receiver } }) =>
      block === 'link' && receiver.kind === 'converter' && receiver.converter.aperture_jitter === null,
    evaluate: judged(apertureOutcome),
  },
  {
    name: 'credible',
    title: 'Loop: measured oscillator within what its power allows',
    quantity: 'figure of merit',
    unit: 'dB',
    sense: 'at most',
    asked: ({ settings }) => settings.oscillator?.phase_noise != null && settings.oscillator.current !== null,
    evaluate: judged(ceilingOutcome),
  },
]

type Values = readonly (readonly [string, number | null, string, string?])[]

const NOT_TRACKED = 'no receiver tracks this clock'
const NO_INTERVAL = 'a clock block has no unit interval'
const NO_FILTER = 'a realigned oscillator has no loop filter'

function resultsOf(state: State, bench: Bench): readonly NamedResult[] {
  if ('short' in state) return []
  const values = [...loopValues(state, bench), ...budgetValues(bench)]
  return values.map(([name, value, unit, reason]) => ({
    name,
    value,
    unit,
    ...(reason === undefined || value !== null ? {} : { reason }),
  }))
}

function loopValues(loop: ClockLoop, bench: Bench): Values {
  const { sources, f_c, problem, f_CDR } = loop
  const parts = filterPartsOf(loop, bench)
  const flat = flatnessOf(loop, bench)
  const { kind, r, f_ref } = problem
  const sampled = kind === 'type-II'
  const { total } = spectrumOf(loop, Float64Array.of(1e6))
  return [
    ['clock.frequency_Hz', sources.oscillator.f_0, 'Hz'],
    ['clock.multiplication', sources.N, '1'],
    ['clock.loop.bandwidth_Hz', f_c, 'Hz'],
    ['clock.loop.optimum_Hz', flat?.f_opt ?? null, 'Hz', 'the reference gives the bandwidth'],
    ['clock.loop.optimum_jitter_s', flat?.sigma_opt ?? null, 's', 'the reference gives the bandwidth'],
    [
      'clock.loop.half_bandwidth_jitter_s',
      flat?.sigma_half ?? null,
      's',
      'the reference gives the bandwidth',
    ],
    [
      'clock.loop.double_bandwidth_jitter_s',
      flat?.sigma_double ?? null,
      's',
      flat === null ? 'the reference gives the bandwidth' : 'at twice the bandwidth the loop is not stable',
    ],
    ['clock.loop.peaking_dB', peakingOf({ kind, f_c, r, f_ref: sampled ? f_ref : null }), 'dB'],
    [
      'clock.loop.phase_margin_deg',
      sampled ? delayedMargin.run(bench.settings.loop!.phase_margin, f_c, f_ref, FULL_TURN.value) : null,
      'deg',
      NO_FILTER,
    ],
    ['clock.loop.C1_F', parts?.C1 ?? null, 'F', NO_FILTER],
    ['clock.loop.C2_F', parts?.C2 ?? null, 'F', NO_FILTER],
    ['clock.loop.R_ohm', parts?.R ?? null, 'ohm', NO_FILTER],
    ['clock.loop.lock_time_s', lockTimeOf(loop, bench), 's'],
    ['clock.jitter.rms_s', loop.sigma_plain, 's'],
    ['clock.jitter.tracked_rms_s', f_CDR === null ? null : loop.sigma, 's', NOT_TRACKED],
    ['clock.jitter.tracking_corner_Hz', f_CDR, 'Hz', NOT_TRACKED],
    ['clock.phaseNoise.at_1MHz_dBc_Hz', levelOf(total[0]!), 'dBc/Hz'],
    ['clock.oscillator.power_W', sources.oscillator.power, 'W'],
    ['clock.oscillator.current_A', sources.oscillator.current, 'A'],
    ...Object.entries(loop.judged).map(
      ([name, value]) => [`clock.jitter.${name}_rms_s`, value, 's'] as const,
    ),
  ]
}

function budgetValues(bench: Bench): Values {
  const lines = bench.once(budgetLinesAt)
  if (!('sigma_all' in lines)) return []
  const { rates, settings } = bench
  const { sigma_all, DJ_all, path } = lines
  const total =
    settings.error_ratio === null
      ? null
      : totalJitter.run(DJ_all, quantile(settings.error_ratio, 'this scenario', PLAIN), sigma_all)
  const inUI = (time: number | null): number | null =>
    time === null || rates.UI === null ? null : time / rates.UI
  const noTotal = 'the scenario states no error ratio'
  return [
    ['jitter.random_rms_s', sigma_all, 's'],
    ['jitter.bounded_pp_s', DJ_all, 's'],
    ['jitter.total_s', total, 's', noTotal],
    ['jitter.random_rms_UI', inUI(sigma_all), 'UI', NO_INTERVAL],
    ['jitter.bounded_pp_UI', inUI(DJ_all), 'UI', NO_INTERVAL],
    ['jitter.total_UI', inUI(total), 'UI', rates.UI === null ? NO_INTERVAL : noTotal],
    ['jitter.even_odd_pp_s', bench.block === 'clock' ? null : path.J_eo, 's', 'a clock block has one phase'],
    ['jitter.path_rms_s', path.sigma, 's'],
  ]
}

/** The phase-locked loop: bandwidth, components, lock time, and the jitter that it leaves. */
export const phaseLockedLoop = subBlock<State>({
  id: 'loop',
  title: 'Phase-locked loop',
  of: ['link', 'clock'],
  asked: ({ settings }) => (settings.loop === null ? notAsked('the scenario states no loop') : ASKED),
  prepare,
  checks: CHECKS,
  results: resultsOf,
  worseBy: (state) => ('short' in state ? Number.POSITIVE_INFINITY : state.sigma),
})
