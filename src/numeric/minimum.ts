/**
 * Least value of a function of one variable on an interval: a scan finds the best place, then Brent's method
 * (parabola through three points, golden section where that is unsafe) refines between its neighbours. A function
 * with several valleys gives the lowest one that the scan sees.
 *
 * Source: R. P. Brent, Algorithms for Minimization without Derivatives, 1973, chapter 5.
 *
 * @param f the function
 * @param from lower end
 * @param to upper end
 * @param places places of the scan, 3 or more, both ends included
 * @param tolerance absolute tolerance on x
 * @returns the place, and whether it is an end of the interval
 */
export function leastOn(
  f: (x: number) => number,
  from: number,
  to: number,
  places: number,
  tolerance: number,
): { readonly x: number; readonly atEnd: 'from' | 'to' | null } {
  const step = (to - from) / (places - 1)
  let best = 0
  let least = Number.POSITIVE_INFINITY
  for (let k = 0; k < places; k++) {
    const y = f(from + k * step)
    if (y < least) {
      least = y
      best = k
    }
  }
  const [low, high] = [from + Math.max(0, best - 1) * step, from + Math.min(places - 1, best + 1) * step]
  const found = leastBetween(f, low, high, tolerance)
  if (best === 0 && found - from < 2 * tolerance) return { x: from, atEnd: 'from' }
  if (best === places - 1 && to - found < 2 * tolerance) return { x: to, atEnd: 'to' }
  return { x: found, atEnd: null }
}

const GOLDEN = (3 - Math.sqrt(5)) / 2

/** Brent's method between two places. */
function leastBetween(f: (x: number) => number, low: number, high: number, tolerance: number): number {
  let [a, b] = [low, high]
  let x = a + GOLDEN * (b - a)
  let [v, w] = [x, x]
  let fx = f(x)
  let [fv, fw] = [fx, fx]
  let [moved, before] = [0, 0]
  for (let k = 0; k < 80; k++) {
    const middle = (a + b) / 2
    if (Math.abs(x - middle) <= 2 * tolerance - (b - a) / 2) break
    const parabola = vertex(x, fx, w, fw, v, fv)
    const fits = Math.abs(parabola) < Math.abs(before / 2) && x + parabola > a && x + parabola < b
    before = fits ? moved : x < middle ? b - x : a - x
    moved = fits ? parabola : GOLDEN * before
    const u = x + (Math.abs(moved) >= tolerance ? moved : moved > 0 ? tolerance : -tolerance)
    const fu = f(u)
    if (fu <= fx) {
      if (u < x) b = x
      else a = x
      ;[v, fv, w, fw, x, fx] = [w, fw, x, fx, u, fu]
    } else {
      if (u < x) a = u
      else b = u
      if (fu <= fw || w === x) [v, fv, w, fw] = [w, fw, u, fu]
      else if (fu <= fv || v === x || v === w) [v, fv] = [u, fu]
    }
  }
  return x
}

/** Step from x to the vertex of the parabola through three points; infinite when they lie on a line. */
function vertex(x: number, fx: number, w: number, fw: number, v: number, fv: number): number {
  const r = (x - w) * (fx - fv)
  const q = (x - v) * (fx - fw)
  const p = (x - v) * q - (x - w) * r
  const twice = 2 * (q - r)
  return twice === 0 ? Number.POSITIVE_INFINITY : -p / twice
}
