import { marginAtLeast, marginInDecibel } from '../derivation/margin.ts'
import { BOLTZMANN, deviceAt, typicalPoint } from '../device/conditions.ts'
import { fo4At } from '../device/fo4.ts'
import type { Bench } from './bench.ts'
import {
  apertureRatio,
  type ConverterNeed,
  converterNeed,
  NO_TARGET,
  resolutionRatio,
  subConverterLimit,
} from './converter-need.ts'
import { coreStressCheck } from './core-stress.ts'
import { constant, subConverterRate } from './decision.ts'
import { deviceResults, notedDesignDensity } from './design-point.ts'
import { holdBuffer } from './hold-buffer.ts'
import {
  highestInput,
  noiseCapacitance,
  rankCapacitance,
  SUB_INPUT,
  SWITCH_SHARE,
  samplingCapacitance,
  samplingSwitch,
  switchDemand,
} from './sampling-switch.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import { derivedRoute } from './stage-speed.ts'
import {
  ASKED,
  type CheckSpec,
  type NamedResult,
  notAsked,
  type Outcome,
  subBlock,
  type Unprepared,
} from './sub-block.ts'

interface TrackAndHold extends Stacked {
  readonly need: ConverterNeed
  readonly C_s: number
}

function prepare(bench: Bench): TrackAndHold | Unprepared {
  const { stack, settings, t, at } = bench
  if (stack.missing !== undefined) return { unknown: stack.missing }
  const { full_scale, ranks } = settings.receiver.converter
  const need = converterNeed(bench)
  const C_rank = t.calc(rankCapacitance, constant(SUB_INPUT, t), ranks)
  // Without a resolution the capacitor is only known not to be smaller, which loads the buffer most.
  const C_s =
    need.ENOB === null
      ? C_rank
      : t.calc(
          samplingCapacitance,
          t.calc(noiseCapacitance, BOLTZMANN.value, at.T, need.ENOB, full_scale),
          C_rank,
        )
  return { ...holdBuffer(bench, stack, C_rank, C_s), need, C_s }
}

const unknown = (reason: string): Outcome => ({
  required: null,
  available: null,
  margin: null,
  basis: 'not computed',
  reason,
})

function switchOutcome({ speed }: TrackAndHold, bench: Bench): Outcome {
  const { t, rates, V_core, settings } = bench
  const J = notedDesignDensity(speed, bench.guard, t)
  if (J === null) return { ...derivedRoute(speed, t), basis: speed.capability.binding }
  const required = t.calc(switchDemand, rates.f_N!, constant(SWITCH_SHARE, t))
  const V_in = t.calc(highestInput, speed.stage.supplyNeeded(J, t), settings.headroom.reserve)
  const available = samplingSwitch(bench, V_in)
  const margin = t.calc(marginAtLeast, available, required)
  return {
    required,
    available,
    margin,
    basis: 'on-resistance at the lowest core supply, at the highest input of the buffer',
    supply: V_core,
  }
}

function resolutionOutcome({ need }: TrackAndHold, { settings, t }: Bench): Outcome {
  if (need.SQNR === null) return unknown(NO_TARGET)
  const required = need.SQNR
  const available = t.calc(resolutionRatio, settings.receiver.converter.resolution!)
  return {
    required,
    available,
    margin: t.calc(marginInDecibel, available, required),
    basis: 'slicer, noise enhancement, peak-to-average ratio and share of quantisation',
  }
}

const TYPICAL_300K = typicalPoint(300)

function rateOutcome({ need }: TrackAndHold, { settings, node, nmos, rates, V_core, t }: Bench): Outcome {
  if (need.ENOB === null) return unknown(NO_TARGET)
  const delay = fo4At(node, nmos, deviceAt(node.nmos, TYPICAL_300K, t), V_core, t)
  const required = t.calc(subConverterRate, rates.f_B!, settings.receiver.converter.sub_converters)
  const available = t.calc(subConverterLimit, need.ENOB, delay)
  return {
    required,
    available,
    margin: t.calc(marginAtLeast, available, required),
    basis: "fan-out-of-four delay of the node's devices at the lowest core supply",
    supply: V_core,
  }
}

function apertureOutcome({ need }: TrackAndHold, bench: Bench): Outcome {
  return apertureAgainst(need, bench.settings.receiver.converter.aperture_jitter!, bench)
}

/**
 * Necessary, not sufficient: aperture noise alone must stay within all the noise that the decision allows.
 *
 * @param need what the converter needs
 * @param sigma_j sampling jitter, rms [s]
 * @param bench the case at its operating point
 */
export function apertureAgainst({ SNR_FS }: ConverterNeed, sigma_j: number, { rates, t }: Bench): Outcome {
  if (SNR_FS === null) return unknown(NO_TARGET)
  const available = t.calc(apertureRatio, rates.f_N!, sigma_j)
  return {
    required: SNR_FS,
    available,
    margin: t.calc(marginInDecibel, available, SNR_FS),
    basis: 'aperture noise of a full-scale sine at the Nyquist frequency against all noise allowed',
  }
}

const CHECKS: readonly CheckSpec<TrackAndHold>[] = [
  ...stackChecks('Track-and-hold buffer'),
  coreStressCheck('Sampling switch and converter'),
  {
    name: 'switch',
    title: 'Track-and-hold: sampling switch',
    quantity: 'cut-off frequency of the switch',
    unit: 'Hz',
    sense: 'at least',
    evaluate: switchOutcome,
  },
  {
    name: 'rate',
    title: 'Converter: rate of each sub-converter',
    quantity: 'sampling rate',
    unit: 'Hz',
    sense: 'at least',
    evaluate: rateOutcome,
  },
  {
    name: 'resolution',
    because: 'the scenario states no resolution',
    title: 'Converter: resolution',
    quantity: 'full-scale sine over quantisation noise',
    unit: 'dB',
    sense: 'at least',
    asked: ({ settings }) => settings.receiver.converter.resolution !== null,
    evaluate: resolutionOutcome,
  },
  {
    name: 'aperture',
    title: 'Converter: aperture jitter',
    quantity: 'full-scale sine over aperture noise',
    unit: 'dB',
    sense: 'at least',
    because:
      'the scenario states no aperture_jitter; where it states a loop, the jitter of that clock is judged',
    asked: ({ settings }) => settings.receiver.converter.aperture_jitter !== null,
    evaluate: apertureOutcome,
  },
]

function results({ speed, V_S, need, C_s }: TrackAndHold, bench: Bench): readonly NamedResult[] {
  const { stack } = bench
  if (stack.missing !== undefined) return []
  const named = (name: string, value: number | null, unit: string): NamedResult => ({
    name: `track_and_hold.${name}`,
    value,
    unit,
    ...(value === null ? { reason: NO_TARGET } : {}),
  })
  return [
    ...deviceResults('track_and_hold', speed, stack.device, 1, V_S, bench),
    named('resolution_bits', need.ENOB, '1'),
    named('full_scale_over_noise_dB', need.SNR_FS, 'dB'),
    named('sampling_capacitance_F', need.ENOB === null ? null : C_s, 'F'),
  ]
}

/** The track-and-hold of a converter-based receiver, and what it asks of the converter behind it. */
export const trackAndHold = subBlock<TrackAndHold>({
  id: 'track_and_hold',
  title: 'Track-and-hold and converter',
  of: ['link'],
  asked: ({ settings }) =>
    settings.receiver.kind === 'converter' ? ASKED : notAsked('the receiver decides by slicers'),
  prepare,
  checks: CHECKS,
  results,
})
