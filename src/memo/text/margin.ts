/**
 * A margin as text, never rounded across break-even or the guard.
 *
 * @param margin ratio, 1.00 is break-even; null when unknown
 * @param guard share above break-even that a pass needs, for instance 0.15
 */
export function marginText(margin: number | null, guard: number): string {
  if (margin === null) return '–'
  if (margin >= 1000) return '> 1000'
  if (margin >= 100) return margin.toFixed(0)
  if (margin >= 10) return margin.toFixed(1)
  const zone = (value: number): number => (value < 1 ? 0 : value < 1 + guard ? 1 : 2)
  for (let digits = 2; digits < 6; digits++) {
    const text = margin.toFixed(digits)
    if (zone(Number(text)) === zone(margin)) return text.replace('-', '−')
  }
  return String(margin)
}
