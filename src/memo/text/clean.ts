/**
 * Text from scenario and node files may carry control and direction characters that hide or reorder what a
 * reader sees. Removes them; keeps line ends as single spaces.
 */
export function clean(text: string): string {
  return text
    .replace(/[\r\n\t\u2028\u2029]+/g, ' ')
    .replace(UNSEEN, '')
    .replace(/ {2,}/g, ' ')
    .trim()
}

/** Control, zero-width, bidirectional and interlinear characters, lone surrogates and non-characters. */
const UNSEEN =
  // biome-ignore lint/suspicious/noControlCharactersInRegex: these are what has to go
  /[\u0000-\u001f\u007f-\u009f\u00ad\u061c\u180e\u200b-\u200f\u202a-\u202e\u2060-\u206f\ufeff\ufff9-\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g
