import { closest } from 'fastest-levenshtein'

/** The known word that differs least from a given one. Errors: none; `known` must not be empty. */
export function nearest(word: string, known: readonly string[]): string {
  return closest(word.slice(0, 64), [...known])
}
