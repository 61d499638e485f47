import type { CaseResult, Result } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'

export const caseName = ({ option, node }: Pick<CaseResult, 'option' | 'node'>): string =>
  `${clean(option)} in ${clean(node)}`

/** Which of the cases, as short as it can be said: all, whole options, or by name. */
export function whichCases(some: readonly CaseResult[], { cases, options }: Result): string {
  if (some.length === cases.length) return 'all cases'
  const parts: string[] = []
  for (const { id } of options) {
    const nodes = some.filter(({ option }) => option === id).map(({ node }) => clean(node))
    const all = cases.filter(({ option }) => option === id).length
    if (nodes.length === 0) continue
    parts.push(nodes.length === all ? `${clean(id)} in every node` : `${clean(id)} in ${nodes.join(', ')}`)
  }
  return parts.join('; ')
}
