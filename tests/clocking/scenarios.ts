import type { CaseResult, CheckResult, Result } from '../../src/verdict/result.ts'
import { resultOf } from '../verdict/demos.ts'

/** Invented clock generators and lanes for tests, as text. Keys given replace lines of the base. */
export function clockText(change: Readonly<Record<string, string | null>> = {}): string {
  const lines: Record<string, string | null> = {
    format: '1',
    title: 'A clock',
    block: 'clock',
    nodes: '[P28]',
    process: '{corner: typical, temperature: [27 °C, 27 °C]}',
    supply: '{tolerance: 0 %}',
    oscillator: '{kind: LC, range: [10 GHz, 10 GHz], tail_noise: 0}',
    loop: '{reference: 100 MHz, bandwidth: 1 MHz}',
    ...change,
  }
  return Object.entries(lines)
    .filter(([, value]) => value !== null)
    .map(([key, value]) => `${key}: ${value}\n`)
    .join('')
}

/** A lane in PAM-4 at 28 GBd that only asks for its clock. */
export const laneText = (change: Readonly<Record<string, string | null>> = {}): string =>
  clockText({
    block: 'link',
    data_rate: '56 Gb/s',
    modulation: 'PAM-4',
    clocking: 'half-rate',
    error_ratio: '1e-6',
    oscillator: '{kind: LC, range: [13 GHz, 15 GHz]}',
    examine: '[loop, jitter]',
    ...change,
  })

/** The result of a text. */
export const evaluated = (text: string, explain = false): Promise<Result> => resultOf(text, 'a.yaml', explain)

/** The only case of a text. */
export async function caseOf(text: string, explain = false): Promise<CaseResult> {
  const { cases } = await evaluated(text, explain)
  if (cases.length !== 1) throw new Error(`${cases.length} cases`)
  return cases[0]!
}

/** A named result of a case; it must have a value. */
export function named({ results }: CaseResult, name: string): number {
  const value = results[name]?.value
  if (value === null || value === undefined) throw new Error(`no ${name}`)
  return value
}

/** A check of a case by its id. */
export const checkOf = ({ checks }: CaseResult, id: string): CheckResult | undefined =>
  checks.find((check) => check.id === id)
