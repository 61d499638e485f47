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

const jitterIsComplete: Rule = ({ jitter_budget: budget }, _block, { has, placeOf }) =>
  budget === null || ['preset', 'random', 'bounded', 'total'].some((one) => has(`jitter_budget.${one}`))
    ? []
    : [
        faultAt(
          placeOf('jitter_budget'),
          'jitter.incomplete',
          'a jitter budget without allowance',
          '`preset`, `random`, `bounded` or `total`',
          'name a preset or at least one allowance',
        ),
      ]

const RULES: readonly Rule[] = [linkIsComplete, clockHasOscillator, channelIsComplete, jitterIsComplete]

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
