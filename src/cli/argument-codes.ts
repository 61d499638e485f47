/** Codes of faults in what was typed, beside those of files. The guide's table is made from both. */
export const ARGUMENT_CODES = {
  'argument.choice': 'A word of the command line is not among the choices.',
  'argument.option': 'The scenario has no option of this id.',
  'argument.node': 'The scenario has no node of this id.',
  'argument.check': 'The case has no check of this id.',
  'argument.file': 'A file of the command line cannot be read or written.',
  'argument.exists': 'A file would be overwritten.',
} as const

export type ArgumentCode = keyof typeof ARGUMENT_CODES
