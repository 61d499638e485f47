import { distance } from 'fastest-levenshtein'

/** The known word closest to a mistaken one, or null when none is close enough to be meant. */
export function nearest(word: string, known: readonly string[]): string | null {
  let best: string | null = null
  let least = Math.max(2, Math.floor(word.length / 3)) + 1
  for (const one of known) {
    const apart = distance(word.toLowerCase(), one.toLowerCase())
    if (apart < least) {
      least = apart
      best = one
    }
  }
  return best
}
