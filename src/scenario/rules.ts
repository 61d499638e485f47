import { formatQuantity } from '../quantity/format.ts'
import { type Fault, faultAt, type Place } from './fault.ts'
import type { ScenarioHead, Settings } from './keys/index.ts'

/** The merged keys of one option: whether a dotted path is written, and where a fault about it belongs. */
export interface Written {
  readonly has: (path: string) => boolean
  readonly placeOf: (key: string) => Place
}

/** What must hold between keys. Values that could not be read are null, so what is written is asked of the text. */
type Rule = (settings: Settings, block: ScenarioHead['block'], written: Written) => readonly Fault[]

const NEEDED_BY_LINK = [
  ['data_rate', 'the data rate of one lane, for instance `56 Gb/s`'],
  ['modulation', 'PAM-2, PAM-4 or PAM-8'],
  ['clocking', 'full-rate, half-rate, quarter-rate or eighth-rate'],
  ['error_ratio', 'the error ratio before error correction, for instance `1e-6`'],
] as const

const linkIsComplete: Rule = (_settings, block, { has, placeOf }) =>
  block !== 'link'
    ? []
    : NEEDED_BY_LINK.filter(([key]) => !has(key)).map(([key, what]) =>
        faultAt(
          placeOf(key),
          'key.missing',
          `no \`${key}\``,
          what,
          `add \`${key}\`: a link is not judged on a silent default for it`,
        ),
      )

const clockHasOscillator: Rule = (_settings, block, { has, placeOf }) =>
  block === 'clock' && !has('oscillator')
    ? [
        faultAt(
          placeOf('oscillator'),
          'oscillator.missing',
          'no `oscillator`',
          'a clock block with an oscillator',
          'add `oscillator: {kind: LC, range: [10 GHz, 12 GHz]}`',
        ),
      ]
    : []

const channelIsComplete: Rule = ({ channel }, _block, { has, placeOf }) =>
  channel === null || has('channel.file') || (has('channel.loss') && has('channel.at'))
    ? []
    : [
        faultAt(
          placeOf('channel'),
          'channel.incomplete',
          'a channel without loss and frequency',
          '`loss` and `at`, or `file`',
          'give the loss and the frequency it holds at',
        ),
      ]

const noiseIsOne: Rule = (_settings, _block, { has, placeOf }) =>
  has('noise.density') && has('noise.figure')
    ? [
        faultAt(
          placeOf('noise'),
          'noise.twice',
          'a noise density beside a noise figure',
          'one of them',
          'keep the one that was measured or specified',
        ),
      ]
    : []

const INTERVALS = ['random_ui', 'bounded_ui', 'total_ui', 'even_odd_ui'] as const
const ALLOWANCES = ['preset', 'random', 'bounded', 'total', 'even_odd', ...INTERVALS]

const jitterIsComplete: Rule = ({ jitter_budget: budget }, _block, { has, placeOf }) =>
  budget === null || ALLOWANCES.some((one) => has(`jitter_budget.${one}`))
    ? []
    : [
        faultAt(
          placeOf('jitter_budget'),
          'jitter.incomplete',
          'a jitter budget without allowance',
          '`preset`, `random`, `bounded`, `total` or `even_odd`',
          'name a preset or at least one allowance',
        ),
      ]

const presetFitsBlock: Rule = ({ jitter_budget: budget }, block, { has, placeOf }) => {
  const preset = budget?.preset ?? null
  if (preset === null || !has('jitter_budget.preset')) return []
  const ofClock = preset.startsWith('pcie-refclk')
  if (ofClock === (block === 'clock')) return []
  const found = `\`${preset}\` in a ${block} block`
  return [
    faultAt(
      placeOf('jitter_budget'),
      'jitter.preset-block',
      found,
      ofClock ? 'this preset in a clock block' : 'this preset in a link block',
      block === 'clock'
        ? 'state the allowances, or take a preset of reference clocks'
        : 'take a preset of lanes',
    ),
  ]
}

const clockHasNoInterval: Rule = ({ jitter_budget: budget }, block, { placeOf }) =>
  block !== 'clock' || budget === null
    ? []
    : INTERVALS.filter((key) => budget[key] != null).map((key) =>
        faultAt(
          placeOf('jitter_budget'),
          'jitter.unit-interval',
          `\`${key.slice(0, -3)}\` in UI`,
          'a time, such as `150 fs`',
          'state the allowance as a time',
        ),
      )

const loopHasOscillator: Rule = ({ loop }, block, { has, placeOf }) =>
  loop === null || block === 'clock' || has('oscillator')
    ? []
    : [
        faultAt(
          placeOf('loop'),
          'loop.oscillator',
          'a loop without `oscillator`',
          'the oscillator that it locks',
          'add `oscillator: {kind: LC, range: [13 GHz, 15 GHz]}`',
        ),
      ]

const OF_LINKS = [
  'data_rate',
  'modulation',
  'clocking',
  'transmitter',
  'receiver',
  'pads',
  'channel',
  'noise',
  'fec',
] as const

/** A clock block has one phase, whose even and odd edges it does not tell apart. */
const ONE_PHASE = ['jitter_budget.even_odd', 'jitter_budget.even_odd_ui'] as const

/** Keys that say nothing about a clock would be ignored: better said than silently so. */
const clockHasNoLane: Rule = (_settings, block, { has, placeOf }) =>
  block !== 'clock'
    ? []
    : [...OF_LINKS, ...ONE_PHASE]
        .filter(has)
        .map((key) =>
          faultAt(
            placeOf(key.split('.')[0]!),
            'key.other-block',
            `\`${key}\` in a clock block`,
            'keys of the clock: oscillator, divider, clock, loop, jitter_budget, power_budget and what all blocks have',
            'remove it, or write `block: link`',
          ),
        )

/** Least ratio of the ends of a band of integration. */
const NARROWEST = 2

const bandHoldsEnough: Rule = ({ loop }, _block, { placeOf }) => {
  const band = loop?.band ?? null
  if (band === null || band[1] >= NARROWEST * band[0]) return []
  return [
    faultAt(
      placeOf('loop'),
      'loop.band',
      `a band from ${formatQuantity(band[0], 'Hz')} to ${formatQuantity(band[1], 'Hz')}`,
      `an upper end of at least ${NARROWEST} times the lower`,
      'widen `band`, for instance `[1 kHz, 1 GHz]`',
    ),
  ]
}

/** A profile must hold the whole band; a reference only up to half its frequency, where its sampling ends. */
const profilesCoverBand: Rule = ({ loop, oscillator }, _block, { placeOf }) => {
  const band = loop?.band ?? null
  if (loop === null || band === null) return []
  const reference = loop.reference ?? Number.POSITIVE_INFINITY
  return [
    ...uncovered('oscillator', oscillator?.phase_noise ?? null, band, placeOf),
    ...uncovered('loop', loop.reference_noise, [band[0], Math.min(band[1], reference / 2)], placeOf),
  ]
}

function uncovered(
  group: string,
  rows: readonly (readonly number[])[] | null,
  [low, high]: readonly [number, number],
  placeOf: Written['placeOf'],
): readonly Fault[] {
  if (rows === null || rows.length === 0) return []
  const [first, last] = [rows[0]![0]!, rows.at(-1)![0]!]
  if (rows.length > 1 && first <= low && last >= high) return []
  const said = (from: number, to: number): string =>
    `${formatQuantity(from, 'Hz')} to ${formatQuantity(to, 'Hz')}`
  return [
    faultAt(
      placeOf(group),
      'profile.short',
      rows.length === 1 ? 'a profile of one offset' : `a profile from ${said(first, last)}`,
      `two offsets or more that cover ${said(low, high)}`,
      'add offsets, or narrow `loop.band`',
    ),
  ]
}

const RULES: readonly Rule[] = [
  linkIsComplete,
  clockHasOscillator,
  channelIsComplete,
  noiseIsOne,
  jitterIsComplete,
  presetFitsBlock,
  clockHasNoInterval,
  clockHasNoLane,
  loopHasOscillator,
  bandHoldsEnough,
  profilesCoverBand,
]

/** Every fault between the keys of one option. */
export function crossFaults(
  settings: Settings,
  block: ScenarioHead['block'],
  written: Written,
): readonly Fault[] {
  return RULES.flatMap((rule) => rule(settings, block, written))
}

/** A date written as YYYY-MM-DD that is no day of the calendar. */
export function dateFault(date: string, place: Place): readonly Fault[] {
  const [year, month, day] = date.split('-').map(Number) as [number, number, number]
  const shown = new Date(Date.UTC(year, month - 1, day))
  const exists =
    shown.getUTCFullYear() === year && shown.getUTCMonth() === month - 1 && shown.getUTCDate() === day
  return exists
    ? []
    : [faultAt(place, 'date.impossible', date, 'a day of the calendar', 'correct the month or the day')]
}
