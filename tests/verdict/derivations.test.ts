import { compile, type EvalFunction } from 'mathjs'
import { describe, expect, test } from 'vitest'
import type { Step } from '../../src/derivation/recorder.ts'
import type { CheckResult } from '../../src/verdict/result.ts'
import { DEMO_NAMES, demoFile, demoText, resultOf } from './demos.ts'

/** Every chain of every demo, walked again with mathjs. *Independent*: mathjs evaluates the text that is shown. */

const compiled = new Map<string, EvalFunction>()
function evaluated(step: Step, inputs: Readonly<Record<string, number>>): number {
  let run = compiled.get(step.formula)
  if (run === undefined) {
    run = compile(step.formula)
    compiled.set(step.formula, run)
  }
  return run.evaluate({ ...inputs }) as number
}

/** Values of all steps when one leaf is changed: formulas follow, searches and kernels keep their root. */
function withLeaf(steps: readonly Step[], changed: Step, factor: number): ReadonlyMap<string, number> {
  const values = new Map<string, number>()
  for (const step of steps) {
    const inputs = Object.fromEntries(Object.entries(step.from).map(([name, id]) => [name, values.get(id)!]))
    const own = step.id === changed.id ? step.value * factor : step.value
    values.set(step.id, step.kind === 'formula' ? evaluated(step, inputs) : own)
  }
  return values
}

const idOf = (check: CheckResult, role: Step['yields']): string | undefined =>
  check.steps.find((step) => step.yields === role)?.id

describe.each(DEMO_NAMES)('%s', async (name) => {
  const result = await resultOf(demoText(name), demoFile(name), true)
  const checks = result.cases.flatMap((one) =>
    one.checks.map((check) => ({ where: `${one.option} in ${one.node}`, check })),
  )
  const known = checks.filter(({ check }) => check.margin !== null)

  test('every computed check carries a derivation that yields its required, available and margin', () => {
    expect(known.length).toBeGreaterThan(50)
    for (const { where, check } of known) {
      const yields = Object.fromEntries(
        check.steps.filter(({ yields: role }) => role).map((step) => [step.yields, step.value]),
      )
      expect(yields.margin, `${where} ${check.id}`).toBe(check.margin)
      if (check.required !== null) expect(check.steps.map(({ value }) => value)).toContain(check.required)
      if (check.available !== null) expect(check.steps.map(({ value }) => value)).toContain(check.available)
    }
  })

  test('every input equals the value of an earlier step, and every formula gives its value to 1e-9', () => {
    for (const { where, check } of known) {
      const seen = new Map<string, number>()
      for (const step of check.steps) {
        for (const [input, value] of Object.entries(step.inputs)) {
          expect(seen.get(step.from[input]!), `${where} ${check.id} ${step.symbol}.${input}`).toBe(value)
        }
        if (step.kind === 'formula') {
          const value = evaluated(step, step.inputs)
          expect(Math.abs(value - step.value), `${where} ${check.id} ${step.formula}`).toBeLessThanOrEqual(
            1e-9 * Math.abs(step.value),
          )
        }
        seen.set(step.id, step.value)
      }
    }
  })

  test('no formula merely repeats an input or is a constant', () => {
    for (const { check } of known) {
      for (const step of check.steps.filter(({ kind }) => kind === 'formula')) {
        const names = Object.keys(step.inputs)
        expect(names.length, step.formula).toBeGreaterThan(0)
        expect(names).not.toContain(step.formula)
      }
    }
  })

  test('results move when leaves are changed', () => {
    for (const { where, check } of known.slice(0, 60)) {
      const margin = idOf(check, 'margin')
      const leaves = check.steps.filter(({ kind }) => kind === 'leaf')
      const formulas = check.steps.find(({ id }) => id === margin)?.kind === 'formula'
      if (margin === undefined || !formulas || check.quantity.includes('range')) continue
      const moved = leaves.filter((leaf) => withLeaf(check.steps, leaf, 1.01).get(margin) !== check.margin)
      expect(moved.length, `${where} ${check.id}`).toBeGreaterThan(0)
    }
  })

  test('every leaf says where it comes from', () => {
    for (const { check } of known) {
      for (const leaf of check.steps.filter(({ kind }) => kind === 'leaf')) {
        expect(leaf.source, `${check.id} ${leaf.symbol}`).not.toBe('')
        expect(leaf.meaning, `${check.id} ${leaf.symbol}`).not.toBe('')
        expect(leaf.unit, `${check.id} ${leaf.symbol}`).not.toBe('')
      }
    }
  })

  test('explaining changes no number', async () => {
    const plain = await resultOf(demoText(name), demoFile(name), false)
    const bare = (one: typeof result) =>
      one.cases.map(({ checks: all, clocking: _curves, ...rest }) => ({
        ...rest,
        checks: all.map(({ steps: _, ...check }) => check),
      }))
    expect(bare(plain)).toEqual(bare(result))
  })
})
