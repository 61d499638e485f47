import { marginAtLeast, marginInDecibel } from '../derivation/margin.ts'
import type { Bench } from './bench.ts'
import { currentModeDriver, driverSize } from './current-mode-driver.ts'
import {
  bodeFano,
  extensionFactor,
  fixedCapacitance,
  padBandwidth,
  padCapacitance,
  receiverShare,
  worstReturnLoss,
} from './pad-network.ts'
import { seriesDriver } from './source-series-driver.ts'
import { derivedRoute } from './stage-speed.ts'
import {
  type AnySubBlock,
  ASKED,
  type NamedResult,
  type Outcome,
  type RouteOutcome,
  subBlock,
  type Unprepared,
} from './sub-block.ts'

type End = 'transmit' | 'receive'

interface Pad {
  readonly C_pad: number
  readonly x_ext: number
  /** What the capacitance rests on, in words. */
  readonly basis: string
}

/** A pad whose driver has no operating point is judged by how much supply the driver lacks. */
interface NoDriver {
  readonly short: RouteOutcome & { readonly margin: number }
  readonly binding: string
}

const BUMP = { 'flip-chip': 'flip_chip', 'micro-bump': 'micro_bump', 'wire-bond': 'wire_bond' } as const

function prepare(end: End, bench: Bench): Pad | NoDriver | Unprepared {
  const { settings, node, t } = bench
  const { cdm_current, bump, extension, transmit_capacitance, receive_capacitance } = settings.pads
  const x_ext = extensionFactor(extension, t)
  const stated = end === 'transmit' ? transmit_capacitance : receive_capacitance
  if (stated !== null) return { C_pad: stated, x_ext, basis: 'stated pad capacitance' }
  const C_fix = t.calc(fixedCapacitance, node.pads.esd, cdm_current, node.pads[BUMP[bump]])
  const device =
    end === 'transmit'
      ? driverDrain(bench)
      : { C: t.calc(receiverShare, C_fix), basis: 'input devices a tenth of protection and bump' }
  if ('unknown' in device || 'short' in device) return device
  return {
    C_pad: t.calc(padCapacitance, C_fix, device.C),
    x_ext,
    basis: `protection, bump and devices (${device.basis})`,
  }
}

interface Drain {
  readonly C: number
  readonly basis: string
}

/** What the driver hangs on its pad [F]. */
function driverDrain(bench: Bench): Drain | NoDriver | Unprepared {
  const { stack, settings } = bench
  if (settings.transmitter.kind === 'source-series') {
    return { C: seriesDriver(bench).C_drain, basis: 'slices of the driver' }
  }
  if (stack.missing !== undefined) return { unknown: stack.missing }
  const { speed } = currentModeDriver(bench, stack)
  if (speed.capability.J === null) {
    return { short: derivedRoute(speed, bench.t), binding: speed.capability.binding }
  }
  return { C: driverSize(speed, stack, bench).C_drain, basis: 'driver at its capability' }
}

/** Outcome of a pad, or that of the driver it waits for. */
const judged =
  (evaluate: (pad: Pad, bench: Bench) => Outcome) =>
  (state: Pad | NoDriver, bench: Bench): Outcome =>
    'short' in state ? { ...state.short, basis: `output driver: ${state.binding}` } : evaluate(state, bench)

function bandwidthOutcome({ C_pad, x_ext, basis }: Pad, { settings, rates, t }: Bench): Outcome {
  const required = rates.f_N!
  const available = t.calc(padBandwidth, x_ext, settings.transmitter.termination, C_pad)
  return { required, available, margin: t.calc(marginAtLeast, available, required), basis }
}

function returnLossOutcome({ C_pad, x_ext, basis }: Pad, { settings, t }: Bench): Outcome {
  const { termination, termination_tolerance } = settings.transmitter
  const { at_least, at } = settings.pads.return_loss!
  const available = worstReturnLoss(termination, termination_tolerance, at, C_pad, x_ext, t)
  const limit = t.calc(bodeFano, at, termination, C_pad)
  const beyond = `no lossless network holds more than ${limit.toFixed(1)} dB up to that frequency on this capacitance`
  return {
    required: at_least,
    available,
    margin: t.calc(marginInDecibel, available, at_least),
    basis: `${basis}; worse end of the termination`,
    ...(limit < at_least ? { reason: beyond } : {}),
    alsoShown: t.recording ? [limit] : [],
  }
}

function results(end: End, state: Pad | NoDriver, { settings, rates, t }: Bench): readonly NamedResult[] {
  if ('short' in state) {
    const reason = 'the output driver has no operating point'
    return [{ name: `pad.${end}.bandwidth_Hz`, value: null, unit: 'Hz', reason }]
  }
  const { C_pad, x_ext, basis } = state
  const { termination: R0, termination_tolerance } = settings.transmitter
  const at = settings.pads.return_loss?.at ?? rates.f_N!
  const named = (name: string, value: number, unit: string, reason?: string): NamedResult => ({
    name: `pad.${end}.${name}`,
    value,
    unit,
    ...(reason === undefined ? {} : { reason }),
  })
  return [
    named('bandwidth_Hz', t.calc(padBandwidth, x_ext, R0, C_pad), 'Hz'),
    named('capacitance_F', C_pad, 'F', basis),
    named(
      'return_loss_dB',
      worstReturnLoss(R0, termination_tolerance, at, C_pad, x_ext, t),
      'dB',
      `at ${(at / 1e9).toFixed(2)} GHz`,
    ),
    named(
      'return_loss_limit_dB',
      t.calc(bodeFano, at, R0, C_pad),
      'dB',
      'Bode and Fano, up to that frequency',
    ),
  ]
}

function pad(end: End, title: string): AnySubBlock {
  return subBlock<Pad | NoDriver>({
    id: `${end}_pad`,
    title,
    of: ['link'],
    asked: () => ASKED,
    prepare: (bench) => prepare(end, bench),
    checks: [
      {
        name: 'bandwidth',
        title: `${title}: bandwidth`,
        quantity: 'bandwidth of the terminated pad',
        unit: 'Hz',
        sense: 'at least',
        evaluate: judged(bandwidthOutcome),
      },
      {
        name: 'return_loss',
        because: 'the scenario asks for no return loss',
        title: `${title}: return loss`,
        quantity: 'return loss',
        unit: 'dB',
        sense: 'at least',
        asked: ({ settings }) => settings.pads.return_loss !== null,
        evaluate: judged(returnLossOutcome),
      },
    ],
    results: (state, bench) => results(end, state, bench),
  })
}

/** The transmit pad: protection, bump and the driver's drain on a doubly terminated line. */
export const transmitPad = pad('transmit', 'Transmit pad')
/** The receive pad: protection, bump and a small share of devices on a doubly terminated line. */
export const receivePad = pad('receive', 'Receive pad')
