import { PLAIN, type Trace } from '../derivation/trace.ts'
import { type Density, densityForSpeed } from '../device/available.ts'
import type { DeviceHere } from '../device/conditions.ts'
import { efficiency, selfGain, speedAt } from '../device/speed.ts'
import { GAIN_FLOOR, gateVoltageAt, saturationVoltageAt } from '../device/voltage.ts'
import type { Bench } from './bench.ts'
import type { StageSpeed } from './stage-speed.ts'
import type { NamedResult } from './sub-block.ts'

/** The design point: the smallest current per width that gives the demand with the guard; else the capability. */
export function designDensity(speed: StageSpeed, guard: number): Density | null {
  const { stage, capability: found } = speed
  if (found.J === null) return null
  const wanted = densityForSpeed(stage, found, speed.demand, 1 + guard)
  return wanted.reached && wanted.J <= found.J ? wanted : { J: found.J, reached: false }
}

/**
 * The device at the design point, as named results.
 *
 * @param id sub-block
 * @param speed the speed question
 * @param device its transistor
 * @param share share of J at which speed and gain are taken: 0.5 switched, 1 linear
 * @param V_S source voltage above bulk [V]
 */
export function deviceResults(
  id: string,
  speed: StageSpeed,
  device: DeviceHere,
  share: number,
  V_S: number,
  bench: Bench,
): readonly NamedResult[] {
  const point = designDensity(speed, bench.guard)
  const named = (name: string, value: number | null, unit: string, reason?: string): NamedResult => ({
    name: `device.${id}.${name}`,
    value,
    unit,
    ...(reason === undefined ? {} : { reason }),
  })
  if (point === null) {
    const reason = 'no operating point'
    return NAMES.map(([name, unit]) => named(name, null, unit, reason))
  }
  const { J } = point
  const at = speedAt(device, J * share, PLAIN)
  const gm_ID = efficiency.run(at.g_m, J * share)
  const note = point.reached ? undefined : 'the demand with guard is out of reach: values at the capability'
  const values = [
    speed.stage.speed(J, PLAIN),
    at.IC,
    J,
    gateVoltageAt(device, J, V_S, PLAIN),
    saturationVoltageAt(device, J, speed.stage.c_sat ?? GAIN_FLOOR.value, PLAIN),
    gm_ID,
    selfGain.run(gm_ID, device.of.V_E, device.of.L),
    speed.stage.speed(speed.capability.J!, PLAIN),
    speed.capability.J,
  ]
  return NAMES.map(([name, unit], k) => named(name, values[k]!, unit, note))
}

const NAMES = [
  ['fT_Hz', 'Hz'],
  ['IC', '1'],
  ['J_A_per_m', 'A/m'],
  ['VGS_V', 'V'],
  ['VDSsat_V', 'V'],
  ['gmOverId_per_V', '1/V'],
  ['selfGain', '1'],
  ['capability.fT_Hz', 'Hz'],
  ['capability.J_A_per_m', 'A/m'],
] as const

/** As {@link designDensity}, written down in the derivation; null without an operating point. */
export function notedDesignDensity(speed: StageSpeed, guard: number, t: Trace): number | null {
  const point = designDensity(speed, guard)
  if (point === null || !t.recording || !point.reached) return point === null ? null : point.J
  return t.search(DESIGN_POINT, point.J, { ...speed.stage.givens, guard })
}

const DESIGN_POINT = {
  symbol: 'J',
  meaning: 'smallest current per width that gives the required speed with the guard',
  unit: 'A/m',
  source: 'search over the current per width',
  residual: 'f_T(J) - (1 + guard) f_T_req(J)',
  tolerance: '1e-10 relative in ln J',
}
