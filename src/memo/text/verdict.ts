import type { Verdict } from '../../verdict/result.ts'

/** How a verdict is painted: told apart by lightness and outline as well as by hue, and always by its word. */
export interface Paint {
  readonly fill: string
  readonly ink: string
  readonly edge: string
  /** Colour of bars and dots. */
  readonly mark: string
  /** Sign before the word. */
  readonly sign: string
}

/**
 * Three hues of clearly different lightness, safe for the common kinds of colour blindness; grey ink on
 * white with a dashed edge where there is no verdict.
 */
export const PAINT: Readonly<Record<Verdict, Paint>> = {
  pass: { fill: '#dceaf7', ink: '#123a63', edge: '#2f6ea8', mark: '#2f6ea8', sign: '●' },
  tight: { fill: '#f3cf86', ink: '#3d2a00', edge: '#8f6200', mark: '#d99a1c', sign: '◆' },
  fail: { fill: '#7c2413', ink: '#ffffff', edge: '#4f1408', mark: '#7c2413', sign: '✕' },
  unknown: { fill: '#ffffff', ink: '#3b3f45', edge: '#3b3f45', mark: '#6b7078', sign: '?' },
}

export const VERDICTS: readonly Verdict[] = ['pass', 'tight', 'fail', 'unknown']
