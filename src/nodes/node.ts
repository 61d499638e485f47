import type { Provenance } from '../scenario/checked.ts'
import type { NodeValues } from './keys.ts'

/** A process candidate: its values in SI and the provenance of each. */
export interface Node {
  readonly id: string
  readonly label: string
  readonly values: NodeValues
  readonly provenance: readonly Provenance[]
}
