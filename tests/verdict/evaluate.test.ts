import { describe, expect, test } from 'vitest'
import type { CaseResult, Result } from '../../src/verdict/result.ts'
import { resultOf } from './demos.ts'

const HEAD =
  'format: 1\ntitle: A test\nblock: link\nmodulation: PAM-2\nclocking: half-rate\nerror_ratio: 1e-12\nguard: 2 %\n'
const evaluated = (text: string, explain = false): Promise<Result> => resultOf(text, 'test.yaml', explain)
const lane = (more: string, nodes = '[P28]'): Promise<Result> =>
  evaluated(`${HEAD}data_rate: 28 Gb/s\nnodes: ${nodes}\nexamine: [clock_buffers]\n${more}`)
const only = (result: Result): CaseResult => {
  expect(result.cases).toHaveLength(1)
  return result.cases[0]!
}

describe('what is asked but not computed', () => {
  test.each([
    ['channel: {loss: 20 dB, at: 14 GHz}', 'link', 'link.operatingMargin_dB'],
    ['power_budget: 50 mW', 'power', 'power.total_W'],
  ])('%s is unknown with its reason, and never a pass', async (asked, subBlock, name) => {
    const found = only(await lane(asked))
    const check = found.checks.find((one) => one.subBlock === subBlock)
    expect(check).toMatchObject({ verdict: 'unknown', margin: null, reason: 'not evaluated in this version' })
    expect(found.verdict).toBe('unknown')
    expect(found.results[name]).toMatchObject({ value: null, reason: 'not evaluated in this version' })
    const without = only(await lane(''))
    expect(without.verdict).toBe('pass')
    expect(without.notExamined.map((one) => one.subBlock)).toContain(subBlock)
  })

  test('a divider without a model is unknown, never judged as static', async () => {
    const found = only(
      await evaluated(
        `${HEAD}data_rate: 28 Gb/s\nnodes: [P28]\nexamine: [divider]\noscillator: {kind: LC, range: [13 GHz, 15 GHz]}\ndivider: {kind: injection-locked}\n`,
      ),
    )
    expect(found.verdict).toBe('unknown')
    expect(found.checks.every(({ verdict, margin }) => verdict === 'unknown' && margin === null)).toBe(true)
  })

  test('an io supply without a device for it is unknown', async () => {
    const found = only(await lane('supply: {use: io}'))
    expect(found.verdict).toBe('unknown')
    expect(found.checks[0]?.reason).toContain('thick-oxide')
  })
})

describe('what is not asked', () => {
  test('is listed as not examined, with the reason', async () => {
    const found = only(await lane(''))
    expect(found.notExamined.find(({ subBlock }) => subBlock === 'lc_oscillator')?.reason).toBe(
      'left out by `examine`',
    )
  })

  test('without an oscillator none is judged', async () => {
    const found = only(await evaluated(`${HEAD}data_rate: 28 Gb/s\nnodes: [P28]\n`))
    for (const part of ['lc_oscillator', 'ring_oscillator', 'divider']) {
      expect(found.notExamined.find(({ subBlock }) => subBlock === part)?.reason).toContain('no oscillator')
    }
  })
})

describe('operating points', () => {
  test('law: every check stands at its own worst point, which no other point undercuts', async () => {
    const worst = only(await lane('', '[F16]'))
    for (const corner of ['slow', 'typical', 'fast']) {
      for (const T of ['-40 °C', '125 °C']) {
        const one = only(await lane(`process: {corner: ${corner}, temperature: [${T}, ${T}]}`, '[F16]'))
        for (const check of one.checks) {
          const least = worst.checks.find(({ id }) => id === check.id)!
          expect(check.margin!).toBeGreaterThanOrEqual(least.margin! * (1 - 1e-12))
        }
      }
    }
  })

  test('the point shown carries corner, temperature and lowest supply', async () => {
    const { operatingPoint } = only(await lane('process: {corner: slow, temperature: [-40 °C, -40 °C]}'))
      .checks[0]!
    expect(operatingPoint).toEqual({ corner: 'slow', temperature_K: 233.15, supply_V: 0.95 * 0.95 })
  })

  test('a lifted supply is used, and then device stress is judged', async () => {
    const lifted = only(await lane('supply: {voltage: 1.2 V}'))
    const stress = lifted.checks.find(({ id }) => id === 'clock_buffers.stress')
    expect(stress?.sense).toBe('at most')
    expect(only(await lane('')).checks.some(({ id }) => id === 'clock_buffers.stress')).toBe(false)
  })
})

describe('uncertain inputs', () => {
  test('a check that fails at an end is capped at tight and says which end', async () => {
    const certain = only(await lane(''))
    expect(certain.verdict).toBe('pass')
    const uncertain = only(await lane('clock: {fan_out: {low: 0.5, typical: 1, high: 12}}'))
    const speed = uncertain.checks.find(({ id }) => id === 'clock_buffers.speed')!
    expect(speed.margin).toBe(certain.checks.find(({ id }) => id === 'clock_buffers.speed')!.margin)
    expect(speed.verdict).toBe('tight')
    expect(speed.reason).toMatch(/fails at the high end of clock\.fan_out/)
  })

  test('an end that passes changes nothing', async () => {
    const uncertain = only(await lane('clock: {fan_out: {low: 0.9, typical: 1, high: 1.1}}'))
    expect(uncertain.verdict).toBe('pass')
    expect(uncertain.checks.every(({ reason }) => !reason?.includes('end of'))).toBe(true)
  })
})

describe('routes to a demand', () => {
  test('law: stricter is the smaller of both margins, and both are always told', async () => {
    const margins = async (route: string) => {
      const { margin, rule, derived } = only(await lane(`demand: {route: ${route}}`)).checks[0]!
      return { margin, rule: rule!.margin!, derived: derived!.margin! }
    }
    const [stricter, rule, derived] = [
      await margins('stricter'),
      await margins('rule'),
      await margins('derived'),
    ]
    expect(stricter.margin).toBe(Math.min(stricter.rule, stricter.derived))
    expect(rule.margin).toBe(rule.rule)
    expect(derived.margin).toBe(derived.derived)
  })

  test('law: a rule formula that writes the multiple out gives what the multiple gives', async () => {
    const byMultiple = only(await lane('demand: {route: rule, multiples: {clock_buffers: 4}}')).checks[0]!
    const byFormula = only(await lane('demand: {route: rule, formulas: {clock_buffers: "4 * f_op / beta"}}'))
      .checks[0]!
    expect(byFormula.required).toBe(byMultiple.required)
    expect(byFormula.margin).toBe(byMultiple.margin)
  })

  test('the formula of a user stands in the derivation', async () => {
    const text = `${HEAD}data_rate: 28 Gb/s\nnodes: [P28]\nexamine: [clock_buffers]\ndemand: {route: rule, formulas: {clock_buffers: "max(4 * f_op, f_B) / beta"}}\n`
    const found = only(await evaluated(text, true))
    expect(found.checks[0]!.steps.some(({ formula }) => formula === 'max(4 * f_op, f_B) / beta')).toBe(true)
  })

  test('a disagreement above 1.6 times is pointed out', async () => {
    const found = only(await lane('demand: {multiples: {clock_buffers: 30}}')).checks[0]!
    expect(found.reason).toMatch(/rule and derived demand differ \d+\.\d times/)
  })
})

describe('the answer', () => {
  const two = `${HEAD}nodes: [P180, P28]\nexamine: [clock_buffers]\noptions:\n  - {id: slow, data_rate: 20 Gb/s}\n  - {id: quick, data_rate: 900 Gb/s}\n`

  test('sorts the cases and says in words where each option works or what stops it', async () => {
    const { answer, cases } = await evaluated(two)
    expect([...answer.passes, ...answer.tight, ...answer.fails, ...answer.unknown]).toHaveLength(cases.length)
    expect(answer.passes).toContain('slow in P28')
    expect(answer.fails).toContain('quick in P180')
    expect(answer.sentence).toContain('slow passes in P28')
    expect(answer.sentence).toMatch(
      /quick fails in every node, and comes closest in P28, limited by Clock buffers/,
    )
  })

  test('law: the order of options and nodes changes no number', async () => {
    const one = await evaluated(two)
    const other = await evaluated(
      two.replace('[P180, P28]', '[P28, P180]').replace(/( {2}- .*\n)( {2}- .*\n)/, '$2$1'),
    )
    for (const a of one.cases) {
      const b = other.cases.find(({ option, node }) => option === a.option && node === a.node)
      expect(b).toEqual(a)
    }
  })

  test('assumptions: shared values once, overridden ones by option, defaults marked', async () => {
    const { assumptions } = await evaluated(two)
    const paths = assumptions.map(({ path }) => path)
    expect(paths).toContain('options.slow.data_rate')
    expect(paths).toContain('nodes.P28.nmos.mu0')
    expect(new Set(paths).size).toBe(paths.length)
    expect(assumptions.find(({ path }) => path === 'headroom.clock_swing')).toMatchObject({
      value: 0.3,
      unit: 'V',
      origin: 'default',
      evidence: 'common practice',
    })
    expect(assumptions.find(({ path }) => path === 'error_ratio')?.origin).toBe('scenario')
  })
})

describe('a rule formula that yields no positive frequency', () => {
  test.each(['1.2e11 - 10 * f_op', 'f_op * sqrt(1.2e10 / f_op - 1)'])(
    '%s makes the check unknown, with the reason',
    async (text) => {
      const found = only(await lane(`demand: {formulas: {clock_buffers: "${text}"}}`)).checks[0]!
      expect(found).toMatchObject({ margin: null, verdict: 'unknown' })
      expect(found.reason).toContain('yields no positive frequency')
      expect(found.derived?.margin).toBeGreaterThan(0)
    },
  )

  test('does not matter where the derived demand was asked for', async () => {
    const found = only(
      await lane('demand: {route: derived, formulas: {clock_buffers: "1.2e11 - 10 * f_op"}}'),
    ).checks[0]!
    expect(found.margin).toBe(found.derived?.margin)
  })

  test('a symbol that the block does not have is told in the same way', async () => {
    const text =
      'format: 1\ntitle: A\nblock: clock\nnodes: [P28]\nexamine: [clock_buffers]\noscillator: {kind: LC, range: [9 GHz, 10 GHz]}\ndemand: {formulas: {clock_buffers: "3 * f_B"}}\n'
    const found = only(await evaluated(text, true)).checks[0]!
    expect(found.verdict).toBe('unknown')
  })
})

test('constants of the method stand among the assumptions where derivations are written down', async () => {
  const text = `${HEAD}data_rate: 28 Gb/s\nnodes: [P28]\nexamine: [sampler]\n`
  const { assumptions } = await evaluated(text, true)
  expect(assumptions.find(({ path }) => path === 'method.kappa_r')).toMatchObject({
    value: 2.6,
    origin: 'default',
    evidence: 'derived',
  })
  expect(
    assumptions.filter(({ path }) => path.startsWith('method.')).every(({ source }) => source !== ''),
  ).toBe(true)
})
