import { marginAtLeast } from '../derivation/margin.ts'
import type { DeviceHere } from '../device/conditions.ts'
import type { Bench } from './bench.ts'
import { notedDesignDensity } from './design-point.ts'
import { crossGainAt } from './latch-load.ts'
import type { Stacked } from './stack-checks.ts'
import { derivedRoute } from './stage-speed.ts'
import type { Outcome } from './sub-block.ts'

/** A stack of latches with its swing [V]. */
export interface Latches extends Stacked {
  readonly device: DeviceHere
  readonly V_sw: number
}

const ONE = { symbol: 'A_regen', meaning: 'least loop gain that holds a state', unit: '1', source: 'law' }

/** Whether the cross pair of a latch holds a state. The gain is taken at the design point; beyond its reach, at the capability. */
export function regenerationOutcome({ speed, device, V_sw }: Latches, bench: Bench): Outcome {
  const { t } = bench
  const J = notedDesignDensity(speed, bench.guard, t)
  if (J === null) return { ...derivedRoute(speed, t), basis: speed.capability.binding }
  const required = t.leaf(ONE, 1)
  const available = crossGainAt(device, J, V_sw, t)
  return {
    required,
    available,
    margin: t.calc(marginAtLeast, available, required),
    basis: 'cross-coupled pair at the design point',
  }
}
