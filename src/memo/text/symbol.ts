import { base, type Run, type Runs, sub } from './runs.ts'

const GREEK: Readonly<Record<string, string>> = {
  alpha: 'α',
  beta: 'β',
  gamma: 'γ',
  delta: 'δ',
  epsilon: 'ε',
  eta: 'η',
  theta: 'θ',
  kappa: 'κ',
  lambda: 'λ',
  mu: 'µ',
  rho: 'ρ',
  sigma: 'σ',
  tau: 'τ',
  phi: 'φ',
  chi: 'χ',
  omega: 'ω',
  pi: 'π',
  ell: 'ℓ',
}

/**
 * A symbol as it is set: `V_DSsat` with a lowered DSsat, `mu0` as µ with a lowered 0, `f_T_int` with T,int.
 * Names of more than one letter that are no Greek letter stay words.
 */
export function setSymbol(name: string): Runs {
  const [head = '', ...rest] = name.split('_')
  const numbered = /^(.*[A-Za-z])(\d+)$/.exec(head)
  const stem = numbered?.[1] ?? head
  const isSymbol = stem.length === 1 || stem in GREEK
  const lowered = [...(numbered !== null && isSymbol ? [numbered[2]!] : []), ...rest.map(greek)].filter(
    (s) => s !== '',
  )
  const main: Run = base(isSymbol ? greek(stem) : greek(head))
  return lowered.length === 0 ? [main] : [main, sub(lowered.join(','))]
}

function greek(word: string): string {
  return Object.hasOwn(GREEK, word) ? GREEK[word]! : word
}
