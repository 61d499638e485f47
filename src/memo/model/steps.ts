import type { Step } from '../../derivation/recorder.ts'
import { clean } from '../text/clean.ts'
import { setFormula } from '../text/formula.ts'
import { type QuantityText, valueText } from '../text/quantity.ts'
import { base, joined, type Runs } from '../text/runs.ts'
import { setSymbol } from '../text/symbol.ts'
import type { StepShown } from './memo-model.ts'

/** Numbers the sources in the order in which derivations name them; lives as long as one memo is made. */
export class SourceList {
  readonly #numbers = new Map<string, number>()

  /** Number of a source, 1 for the first. */
  number(source: string): number {
    const text = clean(source)
    const known = this.#numbers.get(text)
    if (known !== undefined) return known
    this.#numbers.set(text, this.#numbers.size + 1)
    return this.#numbers.size
  }

  get all(): readonly string[] {
    return [...this.#numbers.keys()]
  }
}

/** Sets every step once: the same step in another check is the same object. Lives as long as one memo is made. */
export class StepBook {
  readonly #known = new Map<string, StepShown>()
  /** Checks share the steps that they have in common. */
  readonly #byStep = new Map<Step, StepShown>()
  readonly #sources: SourceList
  readonly #write: QuantityText

  constructor(sources: SourceList, write: QuantityText) {
    this.#sources = sources
    this.#write = write
  }

  /** A step as it is set. Its number within one check is not part of it. */
  shown(step: Step): StepShown {
    const known = this.#byStep.get(step) ?? this.#alike(step)
    this.#byStep.set(step, known)
    return known
  }

  #alike(step: Step): StepShown {
    const { kind, symbol, meaning, formula, inputs, value, unit, source, path, yields, tolerance } = step
    const key = JSON.stringify([
      kind,
      symbol,
      meaning,
      formula,
      inputs,
      value,
      unit,
      source,
      path,
      yields,
      tolerance,
    ])
    const known = this.#known.get(key)
    if (known !== undefined) return known
    const made = shownStep(step, this.#sources, this.#write)
    this.#known.set(key, made)
    return made
  }
}

function shownStep(step: Step, sources: SourceList, write: QuantityText): StepShown {
  const { kind } = step
  return {
    kind,
    symbol: setSymbol(clean(step.symbol)),
    meaning: clean(step.meaning),
    formula: shownFormula(step),
    substituted: kind === 'formula' ? setFormula(step.formula, step.inputs) : givenNumbers(step),
    value: valueText(step.value, step.unit, write),
    source: sources.number(step.source),
    tolerance: clean(step.tolerance ?? ''),
    path: clean(step.path ?? ''),
    yields: step.yields ?? '',
  }
}

function shownFormula({ kind, formula }: Step): Runs {
  if (kind === 'leaf') return []
  return kind === 'kernel' ? [base(clean(formula))] : setFormula(formula)
}

/** What a search or a numeric procedure was given. */
function givenNumbers({ kind, inputs }: Step): Runs {
  if (kind === 'leaf') return []
  const parts = Object.entries(inputs).flatMap(([name, value], k) => [
    base(k === 0 ? '' : ', '),
    ...setSymbol(name),
    base(' = '),
    ...setFormula(String(value)),
  ])
  return joined(parts)
}
