import type { ClockingShown } from '../../clocking/shown.ts'
import type { CaseResult, NamedValue, Result } from '../../verdict/result.ts'
import type { Figure } from '../figure/figure.ts'
import { jitterWaterfall } from '../figure/jitter-waterfall.ts'
import { phaseNoiseFigure } from '../figure/phase-noise.ts'
import { clean } from '../text/clean.ts'
import { marginText } from '../text/margin.ts'
import { type QuantityText, valueText } from '../text/quantity.ts'

/** The clock of one option: figures of its most promising node, and a row for every node. */
export interface ClockingGroup {
  readonly title: string
  /** What makes most of the jitter and what halving it would buy. */
  readonly words: readonly string[]
  readonly figures: readonly Figure[]
  readonly jitter: readonly ClockingRow[]
  readonly parts: readonly ClockingRow[]
}

export interface ClockingRow {
  readonly node: string
  readonly cells: readonly string[]
}

/** Columns of the table of jitter and of that of the loop's parts. */
export const JITTER_COLUMNS = [
  'Loop bandwidth',
  'Random, rms',
  'of it loop',
  'clock path',
  'Bounded, p-p',
  'Total',
  'Even-odd, p-p',
  'Largest line',
] as const
export const PARTS_COLUMNS = [
  'C1',
  'C2',
  'R',
  'Phase margin',
  'Peaking',
  'Lock time',
  'Noise at 1 MHz',
  'Best bandwidth',
  'Jitter there',
  'At half of it',
  'At twice',
] as const

type Clocked = CaseResult & { readonly clocking: ClockingShown }
const isClocked = (given: CaseResult): given is Clocked => given.clocking !== null

/** Clocks of all options; options whose clocks are the same in every node stand together. */
export function clockingGroups(result: Result, write: QuantityText): readonly ClockingGroup[] {
  const groups = new Map<string, { readonly options: string[]; readonly cases: readonly Clocked[] }>()
  for (const { id } of result.options) {
    const cases = result.cases.filter(({ option }) => option === id).filter(isClocked)
    if (cases.length === 0) continue
    const key = JSON.stringify(cases.map(({ node, clocking }) => [node, clocking]))
    const known = groups.get(key)
    if (known === undefined) groups.set(key, { options: [clean(id)], cases })
    else known.options.push(clean(id))
  }
  const drawn = new Map<string, string>()
  return [...groups.values()].map(({ options, cases }, k) =>
    groupOf(options, cases, k, drawn, result.guard, write),
  )
}

function groupOf(
  options: readonly string[],
  cases: readonly Clocked[],
  k: number,
  drawn: Map<string, string>,
  guard: number,
  write: QuantityText,
): ClockingGroup {
  const best = cases.reduce((a, b) => ((b.margin ?? -1) > (a.margin ?? -1) ? b : a))
  const name = `${options.join(', ')} in ${clean(best.node)}`
  const key = JSON.stringify([best.clocking.phaseNoise, best.clocking.tracking_Hz])
  const before = drawn.get(key)
  drawn.set(key, before ?? name)
  const budget = jitterWaterfall(best.clocking, `jitter-${k}`, `Jitter budget: ${name}`, write)
  const noise = (): Figure =>
    phaseNoiseFigure(best.clocking, `phase-noise-${k}`, `Phase noise of the clock: ${name}`, write)
  return {
    title: options.join(', '),
    words: [
      ...wordsOf(best.clocking, name, write),
      ...allowanceWords(best, guard, write),
      ...(before === undefined ? [] : [`Its phase noise is that of ${before}, drawn above.`]),
    ],
    figures: before === undefined ? [noise(), budget] : [budget],
    jitter: cases.map((given) => ({ node: clean(given.node), cells: jitterCells(given, write) })),
    parts: cases.map((given) => ({ node: clean(given.node), cells: partsCells(given, write) })),
  }
}

const percent = (share: number): string => `${Math.round(100 * share)} %`

function wordsOf(
  { largest, leftOut, randomSum_s, bandwidth_Hz, bandwidthFrom, fractional, multiplication }: ClockingShown,
  name: string,
  write: QuantityText,
): readonly string[] {
  const ratio = `${Number(multiplication.toPrecision(6))} times its reference${fractional ? ', a fractional ratio' : ''}`
  const bandwidth = {
    stated: 'the scenario states it',
    optimum: 'where the jitter is least',
    limit: 'the stability limit, and a wider loop would jitter less: a higher reference would help',
    reference: 'given by the reference that realigns the oscillator',
  }[bandwidthFrom]
  return [
    `In ${name} the clock runs at ${ratio}; the loop bandwidth is ${write(bandwidth_Hz, 'Hz')}, ${bandwidth}.`,
    `The largest line of random jitter is the ${largest.label} with ${percent(largest.share)} of the variance; halving it would bring ${write(randomSum_s, 's', 'fs', 3)} down to ${write(largest.halved_s, 's', 'fs', 3)} rms.`,
    ...(leftOut.length === 0
      ? []
      : [
          `The allowances are those of a transmitter: the receiver's own lines (${leftOut.join(', ')}) do not count against them and are not shown.`,
        ]),
  ]
}

/** Each allowance with what is used of it. */
function allowanceWords({ checks }: Clocked, guard: number, write: QuantityText): readonly string[] {
  const judged = checks.filter(({ subBlock }) => subBlock === 'jitter')
  if (judged.length === 0)
    return ['No jitter allowance was asked for, so the jitter is shown and not judged.']
  const said = judged.map(({ quantity, required, available, margin, verdict }) => {
    const used = `${clean(quantity)} ${valueText(available, 's', write)} of ${valueText(required, 's', write)} allowed`
    return `${used} (${verdict}${margin === null ? '' : ` ${marginText(margin, guard)}`})`
  })
  return [`Against ${clean(judged[0]!.basis)}: ${said.join('; ')}.`]
}

function jitterCells({ clocking: c, results }: Clocked, write: QuantityText): readonly string[] {
  const named = (name: string): string => shown(results[name], write)
  const inUI = (time: number | null): string =>
    time === null
      ? '–'
      : c.UI_s === null
        ? write(time, 's')
        : `${write(time, 's')} (${(time / c.UI_s).toPrecision(2)} UI)`
  const path = c.random.find(({ id }) => id === 'path')?.value_s ?? null
  const loop = named(c.tracking_Hz === null ? 'clock.jitter.rms_s' : 'clock.jitter.tracked_rms_s')
  return [
    write(c.bandwidth_Hz, 'Hz'),
    write(c.randomSum_s, 's', 'fs', 3),
    loop,
    valueText(path, 's', write),
    inUI(c.boundedSum_s),
    inUI(c.total_s),
    named('jitter.even_odd_pp_s'),
    `${c.largest.label} ${percent(c.largest.share)}`,
  ]
}

const PARTS = [
  'clock.loop.C1_F',
  'clock.loop.C2_F',
  'clock.loop.R_ohm',
  'clock.loop.phase_margin_deg',
  'clock.loop.peaking_dB',
  'clock.loop.lock_time_s',
  'clock.phaseNoise.at_1MHz_dBc_Hz',
  'clock.loop.optimum_Hz',
  'clock.loop.optimum_jitter_s',
  'clock.loop.half_bandwidth_jitter_s',
  'clock.loop.double_bandwidth_jitter_s',
] as const

const partsCells = ({ results }: Clocked, write: QuantityText): readonly string[] =>
  PARTS.map((name) => shown(results[name], write))

/** Angles as people write them; else a value or a dash. */
function shown(found: NamedValue | undefined, write: QuantityText): string {
  if (found === undefined || found.value === null) return '–'
  if (found.unit === 'deg') return `${found.value.toFixed(0)}°`
  return valueText(found.value, found.unit, write)
}
