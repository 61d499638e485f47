import type { Case } from '../blocks/bench.ts'
import type { CheckResult, NamedValue, NotExamined } from './result.ts'

/** What a scenario can ask and this version does not compute yet: unknown, never silence. */
interface Later {
  readonly subBlock: string
  readonly name: string
  readonly title: string
  readonly quantity: string
  readonly unit: string
  readonly sense: 'at least' | 'at most'
  readonly asked: (given: Case) => boolean
  /** Said when it is not asked. */
  readonly otherwise: string
  /** Names of the results that stay without a value. */
  readonly results: readonly (readonly [string, string])[]
}

const NOT_YET = 'not evaluated in this version'

const LATER: readonly Later[] = [
  {
    subBlock: 'link',
    name: 'margin',
    title: 'Link: operating margin over the channel',
    quantity: 'channel operating margin',
    unit: 'dB',
    sense: 'at least',
    asked: ({ block, settings }) => block === 'link' && settings.channel !== null,
    otherwise: 'the scenario states no channel',
    results: [
      ['link.slicer.snr_dB', 'dB'],
      ['link.operatingMargin_dB', 'dB'],
      ['link.eye.height_V', 'V'],
      ['link.eye.width_UI', 'UI'],
    ],
  },
  {
    subBlock: 'power',
    name: 'total',
    title: 'Power',
    quantity: 'power',
    unit: 'W',
    sense: 'at most',
    asked: ({ block, settings }) => block === 'link' && settings.power_budget !== null,
    otherwise: 'the scenario states no power budget',
    results: [
      ['power.total_W', 'W'],
      ['power.energy_J_per_bit', 'J/bit'],
    ],
  },
]

/** Checks that were asked but wait for a later version, as unknown. */
export function laterChecks(given: Case): readonly CheckResult[] {
  return LATER.filter((later) => later.asked(given)).map(
    ({ subBlock, name, title, quantity, unit, sense }) => ({
      id: `${subBlock}.${name}`,
      subBlock,
      title,
      quantity,
      required: null,
      available: null,
      unit,
      sense,
      margin: null,
      typicalMargin: null,
      verdict: 'unknown',
      operatingPoint: null,
      basis: 'not computed',
      reason: NOT_YET,
      steps: [],
    }),
  )
}

/** Results that were asked but wait for a later version: null with the reason. */
export function laterResults(given: Case): Readonly<Record<string, NamedValue>> {
  const asked = LATER.filter((later) => later.asked(given))
  return Object.fromEntries(
    asked.flatMap(({ results }) =>
      results.map(([name, unit]) => [name, { value: null, unit, reason: NOT_YET }]),
    ),
  )
}

/** What was not asked of these, for the list of what was not examined. A clock block is asked none of them. */
export function laterNotExamined(given: Case): readonly NotExamined[] {
  return LATER.filter((later) => !later.asked(given))
    .filter(() => given.block === 'link')
    .map(({ subBlock, title, otherwise }) => ({ subBlock, title, reason: otherwise }))
}
