import { distance } from 'fastest-levenshtein'

/** No key or choice is as long; comparing longer words would only take time. */
const LONGEST = 80

/** The known word closest to a mistaken one, or null when none is close enough to be meant. */
export function nearest(word: string, known: readonly string[]): string | null {
  if (word.length > LONGEST) return null
  const small = word.toLowerCase()
  const begun = small.length < 3 ? [] : known.filter((one) => one.toLowerCase().startsWith(small))
  if (begun.length === 1) return begun[0]!
  let best: string | null = null
  let least = Math.max(2, Math.floor(word.length / 3)) + 1
  for (const one of known) {
    // Of two equally far, the one of the same length: a slip of the finger is likelier than a missing letter.
    const apart = distance(small, one.toLowerCase()) + (one.length === word.length ? 0 : 0.5)
    if (apart < least) {
      least = apart
      best = one
    }
  }
  return best
}
