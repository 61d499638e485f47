import type { CaseResult, CheckResult, Result, Verdict } from '../../src/verdict/result.ts'

/** An invented check with a margin. */
export function aCheck(
  verdict: Verdict,
  margin: number | null,
  more: Partial<CheckResult> = {},
): CheckResult {
  return {
    id: 'clock_buffers.speed',
    subBlock: 'clock_buffers',
    title: 'Clock buffers: device speed',
    quantity: 'transit frequency',
    required: margin === null ? null : 100e9,
    available: margin === null ? null : margin * 100e9,
    unit: 'Hz',
    sense: 'at least',
    margin,
    typicalMargin: margin,
    verdict,
    operatingPoint: margin === null ? null : { corner: 'slow', temperature_K: 233.15, supply_V: 0.855 },
    basis: 'derived',
    steps: [],
    ...more,
  }
}

/** An invented case with one check. */
export function aCase(option: string, node: string, check: CheckResult): CaseResult {
  return {
    option,
    node,
    verdict: check.verdict,
    margin: check.margin,
    limitedBy: check.margin === null ? null : check.id,
    notExamined: [{ subBlock: 'link', title: 'Link', reason: 'the scenario states no channel' }],
    checks: [check],
    results: {},
    clocking: null,
  }
}

/** An invented result: every option in every node, verdicts in turn. */
export function aResult(options: readonly string[], nodes: readonly string[]): Result {
  const kinds: readonly (readonly [Verdict, number | null])[] = [
    ['pass', 1.4213],
    ['tight', 1.1499],
    ['fail', 0.9996],
    ['unknown', null],
  ]
  const cases = options.flatMap((option, row) =>
    nodes.map((node, column) => {
      const [verdict, margin] = kinds[(row + column) % kinds.length]!
      return aCase(
        option,
        node,
        aCheck(verdict, margin, margin === null ? { reason: 'no floor is stated' } : {}),
      )
    }),
  )
  return {
    format: 1,
    tool: { name: 'tapeworthy', version: '0.0.0' },
    scenario: {
      title: 'An invented lane',
      question: null,
      revision: 'A',
      date: null,
      authors: [],
      notes: null,
      block: 'link',
    },
    inputs: [],
    guard: 0.15,
    options: options.map((id) => ({
      id,
      label: id,
      dataRate_bps: 56e9,
      symbolRate_Bd: 28e9,
      modulation: 'PAM-4',
      clocking: 'half-rate',
    })),
    nodes: nodes.map((id) => ({ id, label: id, class_nm: 28 })),
    assumptions: [],
    cases,
    answer: { sentence: 'It depends.', passes: [], tight: [], fails: [], unknown: [] },
  }
}
