/**
 * What the bench of one operating point runs: every asked check of one case, numbers only. Built into
 * dist/bench.js; change it here when the evaluation changes its name.
 */
import { machineFiles } from '../src/cli/files.ts'
import { load } from '../src/cli/load.ts'
import { askedOf } from '../src/verdict/asked.ts'
import { caseOf } from '../src/verdict/evaluate.ts'
import { outcomesAt } from '../src/verdict/margins.ts'
import { casePoints } from '../src/verdict/points.ts'

export interface PointBench {
  readonly name: string
  /** Checks in one operating point. */
  readonly checks: number
  /** Evaluates operating points one after the other, going round all points of the case. */
  readonly run: (times: number) => number
}

/** Sets up every case of a scenario, so that none of them is the only shape the machine has seen. */
export async function pointBench(file: string, cwd: string): Promise<PointBench> {
  const silent = { write: () => {} }
  const loaded = await load(file, { stdout: silent, stderr: silent, files: machineFiles(), cwd, env: {} })
  if (!loaded.ok) throw new Error(`${file} has faults`)
  const { scenario, nodes } = loaded.value
  const cases = scenario.options.flatMap((option) =>
    nodes.map((node) => {
      const given = caseOf(scenario, option, node)
      return { given, asking: askedOf(given), points: casePoints(given.settings, given.node).judged }
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
