import { createHash } from 'node:crypto'
import { resolve } from 'node:path'
import { type Loaded, loadScenario } from '../nodes/load.ts'
import type { Outcome } from '../scenario/checked.ts'
import { evaluateScenario } from '../verdict/evaluate.ts'
import type { Result } from '../verdict/result.ts'
import { accessOf } from './access.ts'
import type { Io } from './io.ts'
import type { Tool } from './version.ts'

/**
 * Reads a scenario and its nodes. Faults of both are reported together.
 *
 * @param file path as the user wrote it; faults name it so
 * @param io files and working directory
 * @returns the checked input, or every fault. Errors: FileFault when the scenario cannot be read at all.
 */
export async function load(file: string, io: Io): Promise<Outcome<Loaded>> {
  return loadScenario(io.files.readText(resolve(io.cwd, file)), file, accessOf(io))
}

/** Judges what was loaded; `explain` writes every derivation down as well. */
export function judge({ scenario, nodes, files }: Loaded, tool: Tool, explain: boolean): Result {
  const inputs = files.map(({ file, text }) => ({ file, sha256: sha256(text) }))
  return evaluateScenario(scenario, nodes, { tool, inputs, explain })
}

const sha256 = (text: string): string => createHash('sha256').update(text, 'utf8').digest('hex')
