import type { OptionShown, Result } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'
import type { QuantityText } from '../text/quantity.ts'
import type { Fact } from './memo-model.ts'

/** Revision, date, authors, tool and hash of the inputs. What was not given stays visibly blank. */
export function titleFacts({ scenario, tool, inputs }: Result): readonly Fact[] {
  const authors = scenario.authors.map(clean).join(', ')
  return [
    { label: 'Revision', text: clean(scenario.revision ?? '') || 'not given' },
    { label: 'Date', text: clean(scenario.date ?? '') || BLANK },
    { label: 'Author', text: authors || BLANK },
    {
      label: 'Block',
      text: scenario.block === 'link' ? 'link (SerDes lane)' : 'clock (PLL or clock generator)',
    },
    { label: 'Tool', text: clean(`${tool.name} ${tool.version}`) },
    { label: 'Scenario (SHA-256)', text: inputLine(inputs) },
  ]
}

/** The scenario's own hash; the other files are listed with theirs at the end of the memo. */
function inputLine(inputs: Result['inputs']): string {
  const [scenario, ...others] = inputs
  if (scenario === undefined) return 'none recorded'
  const own = `${shortFile(scenario.file)} ${scenario.sha256.slice(0, 12)}…`
  if (others.length === 0) return own
  return `${own} and ${others.length} other ${others.length === 1 ? 'file' : 'files'}, see Inputs`
}

/** Room to write by hand. */
const BLANK = '____________'

/** The last part of a path: where the file lay on somebody's machine is nobody's business. */
export function shortFile(file: string): string {
  return clean(file.split(/[\\/]/).pop() ?? file)
}

/** What an option is, in one line. */
export function optionLine(option: OptionShown, write: QuantityText): string {
  const { dataRate_bps, symbolRate_Bd, modulation, clocking } = option
  return [
    dataRate_bps === null ? null : write(dataRate_bps, 'bit/s', 'Gb/s', 4),
    modulation,
    symbolRate_Bd === null ? null : write(symbolRate_Bd, 'Bd', 'GBd', 4),
    clocking,
  ]
    .filter((part) => part !== null)
    .map(clean)
    .join(', ')
}
