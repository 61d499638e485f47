import { join } from 'node:path'
import { all, create, type EvalFunction, type MathJsInstance } from 'mathjs'
import { describe, expect, it } from 'vitest'
import type { Step } from '../../src/derivation/recorder.ts'
import { optionKeys } from '../../src/scenario/keys/index.ts'
import type { Keys } from '../../src/scenario/schema.ts'
import type { CaseResult, CheckResult, Result, Verdict } from '../../src/verdict/result.ts'
import { filesBelow, ROOT } from '../house/repository.ts'
import { openShell } from './shell.ts'

const math = create(all!) as MathJsInstance
const compiled = new Map<string, EvalFunction>()
function evaluate(formula: string, inputs: Readonly<Record<string, number>>): number {
  const code = compiled.get(formula) ?? math.compile(formula)
  compiled.set(formula, code)
  return Number(code.evaluate({ ...inputs }))
}

const close = (a: number, b: number): boolean =>
  a === b || Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), Math.abs(b))

/** What is wrong with one step, told with its place. */
function stepFaults(step: Step, earlier: ReadonlyMap<string, Step>): readonly string[] {
  const faults: string[] = []
  for (const [name, value] of Object.entries(step.inputs)) {
    const origin = earlier.get(step.from[name] ?? '')
    if (origin === undefined) faults.push(`${step.id}: ${name} comes from no earlier step`)
    else if (!Object.is(origin.value, value))
      faults.push(`${step.id}: ${name} is not the value of ${origin.id}`)
  }
  if (!Number.isFinite(step.value)) faults.push(`${step.id}: ${step.symbol} is ${step.value}`)
  if (step.source.trim() === '') faults.push(`${step.id}: ${step.symbol} has no source`)
  if (step.kind !== 'formula') return faults
  const found = evaluate(step.formula, step.inputs)
  if (!close(found, step.value)) faults.push(`${step.id}: ${step.formula} gives ${found}, not ${step.value}`)
  if (/^[\w.]+$/.test(step.formula)) faults.push(`${step.id}: ${step.formula} is no formula`)
  const moves = Object.keys(step.inputs).some((name) =>
    [0.5, 2].some(
      (by) => evaluate(step.formula, { ...step.inputs, [name]: step.inputs[name]! * by + 1e-30 }) !== found,
    ),
  )
  if (!moves) faults.push(`${step.id}: ${step.formula} does not depend on its inputs`)
  return faults
}

/** Keys that go by another symbol in some formulas, and are meant there. */
const ALIASES: Readonly<Record<string, readonly string[]>> = {
  'supply.core': ['V_nom', 'V', 'V_GS'],
  'supply.core_voltage': ['V_nom', 'V', 'V_GS'],
  'supply.analogue': ['V_nom'],
  'supply.io': ['V_nom'],
  'supply.voltage': ['V_nom'],
  'oscillator.range': ['f_op', 'f_in', 'f_ck', 'f_osc', 'f_0'],
  'oscillator.startup_gain': ['required'],
  'oscillator.tank_q': ['Q_lo', 'Q_hi'],
  error_ratio: ['SER', 'BER'],
  'loop.reference_floor': ['L'],
  'loop.divider_floor': ['L'],
  'loop.flicker': ['L'],
  'loop.lock_time': ['required'],
  'jitter_budget.random': ['required'],
  'jitter_budget.bounded': ['required'],
  'jitter_budget.total': ['required'],
  power_budget: ['required'],
  'fec.target': ['required'],
  'channel.loss': ['IL_at'],
  'channel.at': ['f_at'],
  'supply.device_limit': ['required'],
  'supply.peak_limit': ['required'],
}

/** Inputs said to come from a key that only happens to have the same value. */
function mistaken({ steps }: CheckResult): readonly string[] {
  const known = new Map(steps.map((step) => [step.id, step]))
  return steps.flatMap((step) =>
    Object.entries(step.from).flatMap(([name, id]) => {
      const { kind, symbol, path } = known.get(id)!
      const meant = kind !== 'leaf' || path === undefined || symbol === name || ALIASES[path]?.includes(name)
      return meant === true ? [] : [`${step.symbol}: ${name} is said to come from ${path}`]
    }),
  )
}

/** Keys by dotted path, with where they say that they are used. */
function usedBy(keys: Keys, path = ''): readonly (readonly [string, readonly string[]])[] {
  return Object.entries(keys).flatMap(([name, key]) => {
    const at = path === '' ? name : `${path}.${name}`
    if (key.type === 'group' || key.type === 'section') return usedBy(key.keys, at)
    return key.usedBy === undefined ? [] : [[at, key.usedBy] as const]
  })
}
const USED = new Map(usedBy(optionKeys))

/** Leaves of keys that say they are not used by the sub-block of the check. */
function misplaced({ id, subBlock, steps }: CheckResult): readonly string[] {
  return steps.flatMap(({ path, kind, symbol }) => {
    const users = path === undefined ? undefined : USED.get(path)
    return kind !== 'leaf' || users === undefined || users.includes(subBlock)
      ? []
      : [`${id}: ${symbol} is said to come from ${path}, used by ${users.join(', ')}`]
  })
}

function chainFaults(check: CheckResult): readonly string[] {
  const earlier = new Map<string, Step>()
  const faults = check.steps.flatMap((step) => {
    const found = stepFaults(step, earlier)
    earlier.set(step.id, step)
    return found
  })
  const yields = new Map(
    check.steps.flatMap((step) => (step.yields === undefined ? [] : [[step.yields, step.value]])),
  )
  for (const role of ['required', 'available', 'margin'] as const) {
    const value = check[role]
    if (
      value !== null &&
      check.steps.length > 0 &&
      !check.steps.some((step) => Object.is(step.value, value))
    ) {
      faults.push(`no step yields ${role} (${[...yields.keys()].join(', ')})`)
    }
  }
  if (check.margin !== null && check.steps.length === 0) faults.push('a margin without a derivation')
  return faults
}

/** The verdict that the method gives a case of these checks. */
function verdictOf(one: CaseResult): Verdict {
  const counted = one.checks.filter(({ advisory }) => advisory !== true).map(({ verdict }) => verdict)
  return (['fail', 'unknown', 'tight'] as const).find((verdict) => counted.includes(verdict)) ?? 'pass'
}

describe('the walk', () => {
  const leaf = {
    id: 's1',
    kind: 'leaf',
    symbol: 'a',
    meaning: 'a',
    formula: '',
    inputs: {},
    from: {},
    value: 2,
    unit: '1',
    source: 'given',
  } as const
  const step = {
    ...leaf,
    id: 's2',
    kind: 'formula',
    formula: '3 * a',
    inputs: { a: 2 },
    from: { a: 's1' },
    value: 6,
  } as const
  const walk = (one: Step): number => stepFaults(one, new Map([['s1', leaf]])).length

  it('would notice a wrong value, a wrong origin, a copy, a constant and a missing source', () => {
    expect(walk(step)).toBe(0)
    expect(walk({ ...step, value: 6.00001 })).toBeGreaterThan(0)
    expect(walk({ ...step, inputs: { a: 2.5 }, value: 7.5 })).toBeGreaterThan(0)
    expect(walk({ ...step, from: {} })).toBeGreaterThan(0)
    expect(walk({ ...step, formula: 'a', value: 2 })).toBeGreaterThan(0)
    expect(walk({ ...step, formula: '6 + 0 * a' })).toBeGreaterThan(0)
    expect(walk({ ...step, source: ' ' })).toBeGreaterThan(0)
  })
})

const shell = openShell()
shell.remove()
const demos = filesBelow('scenarios-demo').filter((path) => path.endsWith('.yaml'))

describe('demo scenarios', () => {
  it('are at least four', () => {
    expect(demos.length).toBeGreaterThanOrEqual(4)
  })

  describe.each(demos)('%s', async (path) => {
    const { status, out, err } = await shell.run('check', join(ROOT, path), '--json')
    const result = (status === 0 ? JSON.parse(out) : { cases: [], options: [], nodes: [] }) as Result

    it('has no fault, two options or more and five nodes or more', () => {
      expect(err).toBe('')
      expect(status).toBe(0)
      expect(result.options.length).toBeGreaterThanOrEqual(2)
      expect(result.nodes.length).toBeGreaterThanOrEqual(5)
    })

    it('says which numbers are invented', () => {
      expect(result.scenario.notes ?? '').toMatch(/invented/i)
    })

    it('every chain can be walked with mathjs to 1e-9 (independent)', () => {
      const faults = result.cases.flatMap(({ option, node, checks }) =>
        checks.flatMap((check) =>
          chainFaults(check).map((fault) => `${option} in ${node}, ${check.id}: ${fault}`),
        ),
      )
      const steps = result.cases.flatMap(({ checks }) => checks.flatMap((check) => check.steps))
      expect(steps.filter(({ kind }) => kind === 'formula').length).toBeGreaterThan(500)
      expect(faults.slice(0, 20)).toEqual([])
    })

    it('every input comes from the key it is, not from one that has the same value by chance', () => {
      const wrong = result.cases.flatMap(({ checks }) => checks.flatMap(mistaken))
      expect([...new Set(wrong)]).toEqual([])
    })

    it('every given value comes from a key that the sub-block says it uses', () => {
      const wrong = result.cases.flatMap(({ checks }) => checks.flatMap(misplaced))
      expect([...new Set(wrong)]).toEqual([])
    })

    it('verdicts and margins of the cases follow from their checks (law)', () => {
      for (const one of result.cases) {
        const margins = one.checks.flatMap(({ margin, advisory }) =>
          margin === null || advisory === true ? [] : [margin],
        )
        expect(one.verdict).toBe(verdictOf(one))
        expect(one.margin).toBe(margins.length === 0 ? null : Math.min(...margins))
        for (const check of one.checks) {
          if (check.margin !== null && check.margin < 1) expect(check.verdict).toBe('fail')
          if (check.verdict === 'pass') expect(check.margin).toBeGreaterThanOrEqual(1 + result.guard)
          if (check.margin === null) expect(check.reason ?? '').not.toBe('')
        }
      }
    })
  })
})
