import { cornerPoint, type OperatingPoint, typicalPoint } from '../device/conditions.ts'
import type { NodeValues } from '../nodes/keys.ts'
import type { Settings } from '../scenario/keys/index.ts'

/** The operating points a case is judged at, and the typical one that is shown beside them. */
export interface CasePoints {
  readonly judged: readonly OperatingPoint[]
  readonly typical: OperatingPoint
}

/** Corners × ends of the temperature range, all at the lowest supply; and the typical point at nominal supply. */
export function casePoints(settings: Settings, node: NodeValues): CasePoints {
  const { corner, temperature, typical_temperature, ageing } = settings.process
  const corners = corner === 'worst' ? (['slow', 'typical', 'fast'] as const) : [corner]
  const tolerance = settings.supply.tolerance ?? node.supply.tolerance
  const [cold, hot] = temperature
  const ends = cold === hot ? [cold] : [cold, hot]
  return {
    judged: corners.flatMap((at) => ends.map((T) => cornerPoint(node, at, T, tolerance, ageing))),
    typical: typicalPoint(typical_temperature),
  }
}
