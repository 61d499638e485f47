/** Text as UTF-8. */
export const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text)

/** Stretches of bytes one after another. */
export function joinedBytes(parts: readonly Uint8Array[]): Uint8Array {
  const whole = new Uint8Array(parts.reduce((sum, { length }) => sum + length, 0))
  let at = 0
  for (const part of parts) {
    whole.set(part, at)
    at += part.length
  }
  return whole
}
