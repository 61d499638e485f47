/**
 * What the bench of one operating point runs: every asked check of one case, numbers only. Built into
 * dist/bench.js; change it here when the evaluation changes its name.
 */

import { benchAt } from '../src/blocks/bench.ts'
import { keeping } from '../src/blocks/kept.ts'
import { SUB_BLOCKS } from '../src/blocks/registry.ts'
import { machineFiles } from '../src/cli/files.ts'
import { load } from '../src/cli/load.ts'
import { budgetLinesAt } from '../src/clocking/budget/lines.ts'
import { PLAIN } from '../src/derivation/trace.ts'
import { withNumber } from '../src/scenario/checked.ts'
import { type Asking, askedOf } from '../src/verdict/asked.ts'
import { caseOf, evaluateCase } from '../src/verdict/evaluate.ts'
import { outcomesAt } from '../src/verdict/margins.ts'
import { casePoints } from '../src/verdict/points.ts'

export interface PointBench {
  readonly name: string
  /** Checks in one operating point. */
  readonly checks: number
  /** Evaluates operating points one after the other, going round all points of the case. */
  readonly run: (times: number) => number
}

/** Without the clock as a whole, which has figures of its own. */
const subBlocksOf = (asking: Asking): Asking => ({
  ...asking,
  blocks: asking.blocks.filter(({ block }) => SUB_BLOCKS.includes(block)),
})

/** Sets up every case of a scenario, so that none of them is the only shape the machine has seen. */
export async function pointBench(file: string, cwd: string): Promise<PointBench> {
  const silent = { write: () => {} }
  const loaded = await load(file, { stdout: silent, stderr: silent, files: machineFiles(), cwd, env: {} })
  if (!loaded.ok) throw new Error(`${file} has faults`)
  const { scenario, nodes } = loaded.value
  const cases = scenario.options.flatMap((option) =>
    nodes.map((node) => {
      const given = caseOf(scenario, option, node)
      return {
        given,
        asking: subBlocksOf(askedOf(given)),
        points: casePoints(given.settings, given.node).judged,
      }
    }),
  )
  const points = cases.flatMap(({ given, asking, points: judged }) =>
    judged.map((at) => () => outcomesAt(given, asking, at)),
  )
  return {
    name: `${scenario.options.length} options in ${nodes.length} nodes, ${points.length} points in turn`,
    checks: points[0]!().length,
    run: (times) => {
      let sum = 0
      for (let k = 0; k < times; k++) sum += points[k % points.length]!().length
      return sum
    },
  }
}

export interface ClockBench {
  readonly name: string
  /** Judges whole clock cases, each with its best bandwidth found anew at every operating point. */
  readonly cases: (times: number) => number
  /** Draws of the tank's quality factor with a stated bandwidth: integrals are kept, everything else is computed. */
  readonly draws: (times: number) => number
}

/** Sets up the clock cases of a scenario. */
export async function clockBench(file: string, cwd: string): Promise<ClockBench> {
  const silent = { write: () => {} }
  const loaded = await load(file, { stdout: silent, stderr: silent, files: machineFiles(), cwd, env: {} })
  if (!loaded.ok) throw new Error(`${file} has faults`)
  const { scenario, nodes } = loaded.value
  const about = { tool: { name: 'bench', version: '0' }, inputs: [], explain: false }
  const all = scenario.options.flatMap((option) =>
    nodes.map((node) => ({ option, node, given: caseOf(scenario, option, node) })),
  )
  const fixed = all
    .filter(({ given }) => given.settings.oscillator?.kind === 'LC')
    .map(({ given }) => ({
      given: { ...given, settings: withNumber(given.settings, 'loop.bandwidth', 5e5), kept: keeping() },
      at: casePoints(given.settings, given.node).judged[0]!,
    }))
  return {
    name: `${all.length} cases of ${file}`,
    cases: (times) => {
      let sum = 0
      for (let k = 0; k < times; k++) {
        const { option, node, given } = all[k % all.length]!
        sum += evaluateCase(given, option, node, about).checks.length
      }
      return sum
    },
    draws: (times) => {
      let sum = 0
      for (let k = 0; k < times; k++) {
        const { given, at } = fixed[k % fixed.length]!
        const settings = withNumber(given.settings, 'oscillator.tank_q', 8 + (k % 97) / 20)
        const lines = budgetLinesAt(benchAt({ ...given, settings }, at, PLAIN))
        if ('sigma_all' in lines) sum += lines.sigma_all
      }
      return sum
    },
  }
}
