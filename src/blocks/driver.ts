import type { Bench, Case } from './bench.ts'
import { coreRunsHigh, coreStressOutcome } from './core-stress.ts'
import { currentModeDriver, driverSize } from './current-mode-driver.ts'
import { deviceResults } from './design-point.ts'
import {
  type SeriesDriver,
  seriesDriver,
  slicesOutcome,
  swingOutcome,
  symbolOutcome,
} from './source-series-driver.ts'
import { type Stacked, stackChecks } from './stack-checks.ts'
import { ASKED, type CheckSpec, type NamedResult, subBlock, type Unprepared } from './sub-block.ts'

type Driver = Stacked | SeriesDriver

function prepare(bench: Bench): Driver | Unprepared {
  const { stack } = bench
  if (bench.settings.transmitter.kind === 'source-series') return seriesDriver(bench)
  return stack.missing === undefined ? currentModeDriver(bench, stack) : { unknown: stack.missing }
}

const isCurrentMode = ({ settings }: Case): boolean => settings.transmitter.kind === 'current-mode'
const isSeries = (given: Case): boolean => !isCurrentMode(given)

const [SPEED, HEADROOM, STRESS] = stackChecks('Output driver')

const CHECKS: readonly CheckSpec<Driver>[] = [
  ...[SPEED!, HEADROOM!].map((check) => ({
    ...check,
    asked: isCurrentMode,
    evaluate: (driver: Driver, bench: Bench) => check.evaluate(driver as Stacked, bench),
  })),
  {
    name: 'slices',
    title: 'Output driver: speed of slices and pre-driver',
    quantity: 'device speed',
    unit: 'Hz',
    sense: 'at least',
    asked: isSeries,
    evaluate: (driver, bench) => slicesOutcome(driver as SeriesDriver, bench),
  },
  {
    name: 'symbol',
    title: 'Output driver: CMOS multiplexer and pre-driver',
    quantity: 'unit interval',
    unit: 's',
    sense: 'at least',
    asked: isSeries,
    evaluate: (_, bench) => symbolOutcome(bench),
  },
  {
    name: 'swing',
    title: 'Output driver: swing within the supply',
    quantity: 'differential output, peak to peak',
    unit: 'V',
    sense: 'at least',
    asked: isSeries,
    evaluate: (_, bench) => swingOutcome(bench),
  },
  {
    ...STRESS!,
    asked: (given) => (isCurrentMode(given) ? STRESS!.asked!(given) : coreRunsHigh(given)),
    evaluate: (driver, bench) =>
      'speed' in driver ? STRESS!.evaluate(driver, bench) : coreStressOutcome(bench),
  },
]

const named = (name: string, value: number, unit: string): NamedResult => ({
  name: `driver.${name}`,
  value,
  unit,
})

function results(driver: Driver, bench: Bench): readonly NamedResult[] {
  const { stack } = bench
  if (!('speed' in driver)) {
    return [
      named('width_nMOS_m', driver.W_n, 'm'),
      named('width_pMOS_m', driver.W_p, 'm'),
      named('gate_capacitance_F', driver.C_gate, 'F'),
      named('drain_capacitance_F', driver.C_drain, 'F'),
    ]
  }
  if (stack.missing !== undefined) return []
  const size = driverSize(driver.speed, stack, bench)
  const note = size.operates
    ? {}
    : { reason: 'no operating point: sized at the largest admissible current per width' }
  return [
    ...deviceResults('driver', driver.speed, stack.device, 0.5, driver.V_S, bench),
    named('current_A', size.I, 'A'),
    { ...named('width_m', size.W, 'm'), ...note },
    { ...named('gate_capacitance_F', size.C_gate, 'F'), ...note },
    { ...named('drain_capacitance_F', size.C_drain, 'F'), ...note },
  ]
}

/** The output driver: current-mode, or source-series-terminated slices. */
export const driver = subBlock<Driver>({
  id: 'driver',
  title: 'Output driver',
  of: ['link'],
  asked: () => ASKED,
  prepare,
  checks: CHECKS,
  results,
})
