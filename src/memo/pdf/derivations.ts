import type { DerivationGroup, MemoModel, StepShown } from '../model/memo-model.ts'
import { PAINT } from '../text/verdict.ts'
import { type Piece, piece, pieces } from './lines.ts'
import type { Sheet } from './sheet.ts'
import { code, plainText, quiet, strong } from './styles.ts'
import { type Cell, cell, drawTable } from './table.ts'

const SIZE = 6.2
/** More cases side by side would make their columns too narrow. */
const ABREAST = 8

type DerivedCase = DerivationGroup['cases'][number]

/** The derivation of what limits each case; the rest is in the other formats. */
export function writeDerivations(sheet: Sheet, { derivations }: MemoModel): void {
  sheet.heading(2, 'Derivations of the limiting checks')
  sheet.paragraph(
    'What limits each case, every formula with its numbers in SI units below it. Where several cases go through the same formulas, one of them is written out and a table gives the numbers of the others, step by step. All other derivations stand in the HTML and JSON of this memo and are printed by the command “tapeworthy why”. Numbers in square brackets refer to the list of sources at the end.',
  )
  for (const { title, cases } of derivations) writeGroup(sheet, title, cases)
}

function writeGroup(sheet: Sheet, title: string, cases: readonly DerivedCase[]): void {
  const [first, ...others] = cases
  if (first === undefined) return
  sheet.heading(3, `${title}: ${first.name}${others.length === 0 ? '' : ` and ${others.length} more`}`)
  sheet.paragraph(verdictLine(first, 'Written out'), plainText(SIZE + 0.8), 0, 'P', 3)
  writeSteps(sheet, title, first)
  for (let from = 0; from < others.length; from += ABREAST) {
    writeValues(sheet, title, first, others.slice(from, from + ABREAST))
  }
}

const verdictLine = ({ name, verdict, margin }: DerivedCase, lead: string): string =>
  `${lead}: ${name}, ${PAINT[verdict].sign} ${verdict} ${margin}.`

interface Numbered {
  readonly step: StepShown
  readonly number: number
}

const numbered = (steps: readonly StepShown[]): readonly Numbered[] =>
  steps.map((step, k) => ({ step, number: k + 1 }))

const isGiven = ({ step: { kind, yields } }: Numbered): boolean => kind === 'leaf' && yields === ''

function writeSteps(sheet: Sheet, title: string, { name, steps }: DerivedCase): void {
  const all = numbered(steps)
  const given = all.filter(isGiven)
  if (given.length > 0) sheet.paragraph(given.flatMap(givenPieces), plainText(SIZE), 0, 'P', 5)
  drawTable(sheet, {
    caption: `Derivation of ${title}, ${name}`,
    columns: [
      { title: 'Step', share: 0.3 },
      { title: 'Formula, then with numbers', share: 0.52 },
      { title: 'Value', share: 0.12, align: 'right' },
      { title: 'Source', share: 0.06, align: 'right' },
    ],
    rows: all.filter((one) => !isGiven(one)).map(stepCells),
    size: SIZE,
    pad: 1.2,
  })
}

/** A given value in running text: number of the step, symbol, value, where it was given, source. */
function givenPieces(
  { step: { symbol, value, path, source }, number }: Numbered,
  k: number,
): readonly Piece[] {
  const style = plainText(SIZE)
  return [
    piece(k === 0 ? 'Given: ' : '; ', k === 0 ? strong(SIZE) : style),
    piece(`${number} `, quiet(SIZE - 0.8)),
    ...pieces(symbol, style),
    piece(` = ${value} `, style),
    ...(path === '' ? [] : [piece(`${path} `, code(SIZE - 0.8))]),
    piece(`[${source}]`, quiet(SIZE - 0.6)),
  ]
}

function stepCells({ step, number }: Numbered): readonly Cell[] {
  const style = plainText(SIZE)
  const role = step.yields === '' ? '' : ` (${step.yields})`
  return [
    { text: [piece(`${number}  `, quiet(SIZE)), piece(`${step.meaning}${role}`, style)] },
    formulaCell(step),
    cell(step.value, step.yields === '' ? style : strong(SIZE)),
    cell(`[${step.source}]`, quiet(SIZE)),
  ]
}

function formulaCell({ kind, symbol, formula, substituted, tolerance, path }: StepShown): Cell {
  const style = plainText(SIZE)
  const numbers = quiet(SIZE)
  const name = [...pieces(symbol, style), piece(' = ', style)]
  const after = tolerance === '' ? [] : [piece(` (${tolerance})`, style)]
  switch (kind) {
    case 'leaf':
      return { text: [...name, piece(path === '' ? 'given' : `given as ${path}`, style)] }
    case 'formula':
      return {
        text: [...name, ...pieces(formula, style)],
        below: [[piece('= ', numbers), ...pieces(substituted, numbers)]],
      }
    case 'search':
    case 'kernel': {
      const lead = kind === 'search' ? [piece('root of ', style)] : []
      const given = [piece('with ', numbers), ...pieces(substituted, numbers)]
      return {
        text: [...name, ...lead, ...pieces(formula, style), ...after],
        below: substituted.length === 0 ? [] : [given],
      }
    }
  }
}

/** The numbers of further cases that go through the same steps; what is the same in all is left out. */
function writeValues(sheet: Sheet, title: string, first: DerivedCase, others: readonly DerivedCase[]): void {
  const rows = numbered(first.steps).filter(({ step, number }) =>
    others.some(({ steps }) => steps[number - 1]!.value !== step.value),
  )
  const small = SIZE - 0.6
  sheet.paragraph(
    'The same steps with the numbers of other cases; steps left out have the value above.',
    plainText(SIZE + 0.8),
    0,
    'P',
    3,
  )
  const columns = [first, ...others]
  drawTable(sheet, {
    caption: `Derivation of ${title}: values of ${others.map(({ name }) => name).join(', ')}`,
    columns: [
      { title: 'Step', share: 0.13 },
      ...columns.map(({ option, node }) => ({ title: `${option} ${node}`, share: 0.87 / columns.length })),
    ],
    rows: rows.map(({ step, number }) => [
      {
        text: [
          piece(`${number}  `, quiet(small)),
          ...pieces(step.symbol, step.yields === '' ? plainText(small) : strong(small)),
        ],
      },
      ...columns.map(({ steps }) => {
        const { value, yields } = steps[number - 1]!
        return cell(value, yields === '' ? plainText(small) : strong(small))
      }),
    ]),
    size: small,
    pad: 0.9,
  })
}
