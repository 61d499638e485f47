import type { Formula } from './formula.ts'
import type { Given, Procedure, Searched, Trace, UserExpression } from './trace.ts'

export type StepKind = 'leaf' | 'formula' | 'search' | 'kernel'

/** One line of a derivation, as in the result contract. Every input equals the value of an earlier step. */
export interface Step {
  readonly id: string
  readonly kind: StepKind
  readonly symbol: string
  readonly meaning: string
  /** `formula`: the expression that ran (mathjs notation). `search`: the residual. `kernel`: the method. */
  readonly formula: string
  readonly inputs: Readonly<Record<string, number>>
  /** For each input, the id of the step it came from. */
  readonly from: Readonly<Record<string, string>>
  readonly value: number
  readonly unit: string
  readonly source: string
  readonly tolerance?: string
  readonly path?: string
  /** Set on the steps that end a check. */
  readonly yields?: 'required' | 'available' | 'margin'
}

/** A given number that a formula may use without being told: the node's and the scenario's own values. */
export interface KnownLeaf extends Given {
  readonly value: number
  /** Where its value is used; absent when anywhere. */
  readonly usedBy?: readonly string[]
}

/** Given numbers by value, so that a recorder finds the origin of an input at once. Made once, used by many. */
export class KnownLeaves {
  readonly #byValue = new Map<number, KnownLeaf[]>()
  readonly #below: KnownLeaves | null

  /** The leaves given, and behind them those of another set. */
  constructor(leaves: readonly KnownLeaf[], below: KnownLeaves | null = null) {
    this.#below = below
    for (const leaf of leaves) {
      const alike = this.#byValue.get(leaf.value)
      if (alike === undefined) this.#byValue.set(leaf.value, [leaf])
      else alike.push(leaf)
    }
  }

  /** The leaf of this symbol and value; of several, one that is used for the purpose, else one used anywhere. */
  named(symbol: string, value: number, purpose: string): KnownLeaf | undefined {
    const own = this.#byValue.get(value)?.filter((leaf) => leaf.symbol === symbol) ?? []
    return mostFitting(own, purpose) ?? this.#below?.named(symbol, value, purpose)
  }

  /** Any leaf of this value, of this unit if one is named, rather one that is used for the purpose. */
  alike(value: number, purpose: string, unit?: string): KnownLeaf | undefined {
    const own = this.#byValue.get(value) ?? []
    const fitting = unit === undefined ? own : own.filter((leaf) => leaf.unit === unit)
    return mostFitting(fitting, purpose) ?? this.#below?.alike(value, purpose, unit)
  }
}

/** The first of those that say they are used for the purpose, else of those that say nothing, else of all. */
function mostFitting(leaves: readonly KnownLeaf[], purpose: string): KnownLeaf | undefined {
  const fits = ({ usedBy }: KnownLeaf): number =>
    usedBy === undefined ? 1 : usedBy.includes(purpose) ? 2 : 0
  return leaves.reduce<KnownLeaf | undefined>(
    (most, leaf) => (most === undefined || fits(leaf) > fits(most) ? leaf : most),
    undefined,
  )
}

/** Thrown when an input cannot be traced to an earlier step or a known leaf: a fault of the program. */
export class DerivationGap extends Error {
  override name = 'DerivationGap'
}

type Draft = Omit<Step, 'id' | 'from'> & { from: Record<string, number> }

/** Computes like the plain trace and writes down every step, linking each input to where it came from. */
export class Recorder implements Trace {
  readonly recording = true
  readonly #drafts: Draft[] = []
  readonly #steps: Step[] = []
  /** Places of the drafts by value, in the order written. */
  readonly #places = new Map<number, number[]>()
  readonly #known: KnownLeaves
  /** Steps that show a search was solved, by the place of its root. */
  readonly #shown = new Map<number, number[]>()

  readonly #purpose: string
  /** Names of parameters that stand for a symbol of another name. */
  readonly #aliases = new Map<string, string>()

  /**
   * @param known given numbers
   * @param purpose id of the sub-block whose checks are written down: of given numbers that share symbol and value,
   * those are meant that it uses
   */
  constructor(known: KnownLeaves, purpose = '') {
    this.#known = known
    this.#purpose = purpose
  }

  alias(parameter: string, symbol: string): void {
    this.#aliases.set(parameter, symbol)
  }

  calc<A extends number[]>(formula: Formula<A>, ...args: A): number {
    const inputs: Record<string, number> = {}
    formula.text.parameters.forEach((name, k) => {
      inputs[name] = args[k] as number
    })
    const value = formula.run(...args)
    const { symbol, meaning, unit, source } = formula
    this.#push(
      { kind: 'formula', symbol, meaning, unit, source, formula: formula.text.expression, value },
      inputs,
    )
    return value
  }

  leaf(about: Given, value: number): number {
    this.#push({ kind: 'leaf', ...about, formula: '', value }, {})
    return value
  }

  search(about: Searched, value: number, inputs: Readonly<Record<string, number>> = {}): number {
    const { symbol, meaning, unit, source, residual, tolerance } = about
    this.#push({ kind: 'search', symbol, meaning, unit, source, formula: residual, tolerance, value }, inputs)
    return value
  }

  expression(about: UserExpression, value: number, inputs: Readonly<Record<string, number>>): number {
    const { symbol, meaning, unit, source, text } = about
    this.#push({ kind: 'formula', symbol, meaning, unit, source, formula: text, value }, inputs)
    return value
  }

  kernel(about: Procedure, value: number, inputs: Readonly<Record<string, number>> = {}): number {
    const { symbol, meaning, unit, source, method, error } = about
    this.#push(
      { kind: 'kernel', symbol, meaning, unit, source, formula: method, tolerance: error, value },
      inputs,
    )
    return value
  }

  show(value: number, of: number): void {
    const root = this.#find('', of)
    const known = this.#shown.get(root)
    if (known === undefined) this.#shown.set(root, [this.#find('', value)])
    else known.push(this.#find('', value))
  }

  /**
   * Where the step with this value stands; prefers one of the same symbol, then one of the unit if that is known, then
   * the latest.
   */
  #find(parameter: string, value: number, unit?: string): number {
    const name = this.#aliases.get(parameter) ?? parameter
    const places = this.#places.get(value) ?? []
    const ofSymbol = places.findLast((k) => this.#drafts[k]!.symbol === name)
    if (ofSymbol !== undefined) return ofSymbol
    const named = this.#known.named(name, value, this.#purpose)
    if (named !== undefined) return this.#adopt(named)
    if (unit !== undefined) {
      const ofUnit = places.findLast((k) => this.#drafts[k]!.unit === unit)
      if (ofUnit !== undefined) return ofUnit
      const leaf = this.#known.alike(value, this.#purpose, unit)
      if (leaf !== undefined) return this.#adopt(leaf)
    }
    const latest = places.at(-1)
    if (latest !== undefined) return latest
    const alike = this.#known.alike(value, this.#purpose)
    if (alike !== undefined) return this.#adopt(alike)
    throw new DerivationGap(`no earlier step or known value yields ${name} = ${value}`)
  }

  #adopt(leaf: KnownLeaf): number {
    const { value, ...about } = leaf
    this.leaf(about, value)
    return this.#drafts.length - 1
  }

  #push(draft: Omit<Draft, 'from' | 'inputs'>, inputs: Readonly<Record<string, number>>): void {
    const places = this.#places.get(draft.value)
    if (places?.some((k) => same(this.#drafts[k]!, draft, inputs))) return
    const from: Record<string, number> = {}
    for (const [name, value] of Object.entries(inputs)) {
      // What is compared has one unit: it tells apart numbers that are equal by chance.
      const other = name === 'required' || name === 'available' ? this.#comparedUnit(name, inputs) : undefined
      from[name] = this.#find(name, value, other)
    }
    const place = this.#drafts.push({ ...draft, inputs: { ...inputs }, from }) - 1
    const alike = this.#places.get(draft.value)
    if (alike === undefined) this.#places.set(draft.value, [place])
    else alike.push(place)
  }

  /** Unit of the other side of a comparison, when that was computed: the latest step of its value. */
  #comparedUnit(name: string, inputs: Readonly<Record<string, number>>): string | undefined {
    const other = inputs[name === 'required' ? 'available' : 'required']
    const places = other === undefined ? undefined : this.#places.get(other)
    const computed = places?.findLast((k) => this.#drafts[k]!.kind !== 'leaf')
    return computed === undefined ? undefined : this.#drafts[computed]!.unit
  }

  /**
   * The derivation of a finished check: only the steps that its three results rest on, in an order in which
   * every step follows its inputs, the results last. `alsoShown` are further values whose derivation is kept.
   */
  steps(
    required: number | null,
    available: number | null,
    margin: number | null,
    alsoShown: readonly number[] = [],
  ): readonly Step[] {
    const ends = new Map<number, NonNullable<Step['yields']>>()
    // What the margin compared is what is marked.
    const compared = margin === null ? undefined : this.#drafts[this.#find('margin', margin)]
    const mark = (value: number | null, role: NonNullable<Step['yields']>): void => {
      if (value === null) return
      const from = compared?.inputs[role] === value ? compared.from[role] : undefined
      ends.set(from ?? this.#find(role, value), role)
    }
    mark(required, 'required')
    mark(available, 'available')
    mark(margin, 'margin')
    const shown = alsoShown.map((value) => this.#find('', value))
    return this.#ordered(ends, shown).map((k) => {
      const role = ends.get(k)
      return role === undefined ? this.#made(k) : { ...this.#made(k), yields: role }
    })
  }

  #ordered(ends: ReadonlyMap<number, string>, shown: readonly number[]): readonly number[] {
    const kept = new Set<number>()
    const keep = (k: number): void => {
      if (kept.has(k)) return
      kept.add(k)
      for (const source of Object.values(this.#drafts[k]!.from)) keep(source)
      for (const shows of this.#shown.get(k) ?? []) keep(shows)
    }
    for (const k of [...ends.keys(), ...shown]) keep(k)
    const inner = [...kept].filter((k) => !ends.has(k))
    const needsEnd = inner.some((k) =>
      Object.values(this.#drafts[k]!.from).some((source) => ends.has(source)),
    )
    const ascending = (a: number, b: number): number => a - b
    if (needsEnd) return [...kept].sort(ascending)
    return [...inner.sort(ascending), ...[...ends.keys()].sort(ascending)]
  }

  /** The step at a place; the same object in every check that rests on it. */
  #made(k: number): Step {
    const known = this.#steps[k]
    if (known !== undefined) return known
    const draft = this.#drafts[k]!
    const from: Record<string, string> = {}
    for (const [name, j] of Object.entries(draft.from)) from[name] = idOf(j)
    const step = { ...draft, id: idOf(k), from }
    this.#steps[k] = step
    return step
  }
}

const idOf = (k: number): string => `s${k + 1}`

/** True when a step was already written down: the same expression over the same numbers. */
function same(
  known: Draft,
  draft: Omit<Draft, 'from' | 'inputs'>,
  inputs: Readonly<Record<string, number>>,
): boolean {
  if (known.symbol !== draft.symbol || known.formula !== draft.formula) return false
  if (known.kind !== draft.kind || known.path !== draft.path || known.meaning !== draft.meaning) return false
  return Object.entries(inputs).every(([name, value]) => Object.is(known.inputs[name], value))
}
