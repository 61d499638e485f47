/** A name that is safe in an address inside the page; unique for different case and check ids. */
export function anchor(...parts: readonly string[]): string {
  return parts
    .map((part) =>
      part.replace(/[^A-Za-z0-9]/gu, (c) => (c === '-' ? '-' : `_${c.codePointAt(0)!.toString(16)}`)),
    )
    .join('.')
}
