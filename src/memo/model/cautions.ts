/** What every memo says about its own reach. */
export const CAUTIONS: readonly string[] = [
  'This is first-order planning. It says whether a block looks buildable and what stands in the way; it does not replace design.',
  'The models of the foundry, extracted layout, electrostatic protection, electromigration, self-heating, ageing and the sign-off rules decide, and so does the engineer who answers for the block. Where they disagree with this memo, they are right.',
  'Protection against electrostatic discharge is taken as the user requires it. Nothing here is advice to go below that requirement in exchange for speed.',
  'Limits of interface standards are to be read in the current edition of the standard before they are relied upon.',
  'Values marked estimate are not measured, and values marked invented describe no real process or product. A verdict is only as good as the values it rests on.',
  'Power and energy figures compare options with one another; they are no promise.',
]

/** Who signs, by role; names and dates are written by hand. */
export const SIGNATURES: readonly string[] = ['Prepared by', 'Checked by', 'Approved by']
