import type { CheckResult, OperatingPointShown, Route } from '../../verdict/result.ts'
import { clean } from '../text/clean.ts'
import { marginText } from '../text/margin.ts'
import { commonUnit, type QuantityText, valueText } from '../text/quantity.ts'
import { anchor } from './anchor.ts'
import type { CheckRow, SharedSteps, StepShown } from './memo-model.ts'
import type { StepBook } from './steps.ts'

/** Corner, temperature and supply in one phrase. */
export function pointText(point: OperatingPointShown | null, write: QuantityText): string {
  if (point === null) return '–'
  const { corner, temperature_K, supply_V } = point
  return `${corner}, ${write(temperature_K, 'K', '°C', 3)}, ${write(supply_V, 'V', 'V', 3)}`
}

/** Required and available in one common unit. */
export function bothValues(
  { required, available, unit }: Pick<CheckResult, 'required' | 'available' | 'unit'>,
  write: QuantityText,
): { readonly required: string; readonly available: string } {
  const shown = commonUnit([required, available], unit)
  return {
    required: valueText(required, unit, write, shown),
    available: valueText(available, unit, write, shown),
  }
}

/** Where the steps of one case are shown first. */
export type FirstShown = Map<StepShown, { readonly anchor: string; readonly title: string }>

/** One check as the tables show it, with its derivation. */
export function checkRow(
  check: CheckResult,
  caseAnchor: string,
  guard: number,
  first: FirstShown,
  book: StepBook,
  write: QuantityText,
): CheckRow {
  const place = { anchor: `${caseAnchor}.${anchor(check.id)}`, title: clean(check.title) }
  const steps = check.steps.map((step) => book.shown(step))
  return {
    ...place,
    id: check.id,
    subBlock: check.subBlock,
    quantity: clean(check.quantity),
    sense: check.required === null ? '' : check.sense,
    ...bothValues(check, write),
    margin: marginText(check.margin, guard),
    typical: marginText(check.typicalMargin, guard),
    verdict: check.verdict,
    advisory: check.advisory === true,
    at: pointText(check.operatingPoint, write),
    basis: clean(check.basis),
    routes: [
      routeText('Rule', check.rule, check, guard, write),
      routeText('Derived', check.derived, check, guard, write),
    ].filter((text) => text !== ''),
    reason: clean(check.reason ?? ''),
    steps,
    ...divided(steps, place, first),
  }
}

/** Own steps, and those that stand under earlier checks of the case; notes down where its own stand. */
function divided(
  steps: readonly StepShown[],
  place: { readonly anchor: string; readonly title: string },
  first: FirstShown,
): { readonly ownSteps: readonly StepShown[]; readonly sharedSteps: readonly SharedSteps[] } {
  const shared = new Map<string, { anchor: string; title: string; steps: StepShown[] }>()
  const own: StepShown[] = []
  for (const step of steps) {
    const known = step.yields === '' ? first.get(step) : place
    if (known === undefined || known === place) {
      first.set(step, place)
      own.push(step)
    } else {
      const group = shared.get(known.anchor) ?? { ...known, steps: [] }
      group.steps.push(step)
      shared.set(known.anchor, group)
    }
  }
  return { ownSteps: own, sharedSteps: [...shared.values()] }
}

function routeText(
  name: string,
  route: Route | undefined,
  { unit }: CheckResult,
  guard: number,
  write: QuantityText,
): string {
  if (route === undefined) return ''
  const { required, available } = bothValues({ ...route, unit }, write)
  const reason = route.reason === undefined ? '' : ` (${clean(route.reason)})`
  return `${name}: ${required} required, ${available} available, margin ${marginText(route.margin, guard)}${reason}`
}
