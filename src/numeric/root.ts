/**
 * Root of a continuous function between two points of opposite sign, by Chandrupatla's method (inverse
 * quadratic interpolation where it is safe, bisection elsewhere).
 *
 * Error: |x − root| ≤ tolerance·max(|x|, 1e-300) relative. Never leaves the bracket.
 * Source: T. R. Chandrupatla, Advances in Engineering Software 28(3), 1997.
 *
 * @param f the function
 * @param a one end of the bracket
 * @param b the other end
 * @param relative relative tolerance on x
 * @returns the root, or NaN when the ends do not have opposite signs (callers must test the ends first)
 */
export function bracketedRoot(f: (x: number) => number, a: number, b: number, relative = 1e-9): number {
  return rootBetween(f, a, f(a), b, f(b), relative)
}

/**
 * As {@link bracketedRoot}, for callers that already know the values at the ends. `simple` promises that f crosses
 * zero with a slope and is smooth or a smaller of smooth functions: the search then ends as soon as the next
 * correction is below the tolerance, without the steps that would close the bracket from the other side.
 */
export function rootBetween(
  f: (x: number) => number,
  a: number,
  fa: number,
  b: number,
  fb: number,
  relative = 1e-9,
  simple = false,
): number {
  if (fa === 0) return a
  if (fb === 0) return b
  if (fa < 0 === fb < 0 || Number.isNaN(fa) || Number.isNaN(fb)) return Number.NaN
  let [x1, f1, x2, f2] = [b, fb, a, fa]
  let [x3, f3] = [x1, f1]
  // Most functions here are nearly straight: the secant is a better first guess than the middle.
  let t = Math.min(0.9, Math.max(0.1, f1 / (f1 - f2)))
  for (let k = 0; k < 200; k++) {
    const x = x1 + t * (x2 - x1)
    const fx = f(x)
    if (fx < 0 === f1 < 0) {
      x3 = x1
      f3 = f1
    } else {
      x3 = x2
      f3 = f2
      x2 = x1
      f2 = f1
    }
    x1 = x
    f1 = fx
    const best = Math.abs(f1) < Math.abs(f2) ? x1 : x2
    const limit = (0.5 * relative * Math.abs(best)) / Math.abs(x2 - x1)
    if (f1 === 0 || limit > 0.5) return best
    const next = nextShare(x1, f1, x2, f2, x3, f3)
    if (simple && next <= 2 * limit) return x1 + next * (x2 - x1)
    t = Math.min(1 - limit, Math.max(limit, next))
  }
  return x1
}

/** Where to look next, as a share of the way from x1 to x2. */
function nextShare(x1: number, f1: number, x2: number, f2: number, x3: number, f3: number): number {
  const xi = (x1 - x2) / (x3 - x2)
  const phi = (f1 - f2) / (f3 - f2)
  if (!(phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi)) return 0.5
  const near = (f1 / (f2 - f1)) * (f3 / (f2 - f3))
  const far = ((x3 - x1) / (x2 - x1)) * (f1 / (f3 - f1)) * (f2 / (f3 - f2))
  return near + far
}
