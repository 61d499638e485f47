import { text } from './schema.ts'

/** Keys of an option beside those it overrides. */
export const optionHeadKeys = {
  id: text({
    meaning: 'Short name of the option.',
    longest: 40,
    required: true,
    pattern: {
      is: /^[A-Za-z0-9][A-Za-z0-9._-]*$/,
      say: 'letters, digits, `.`, `-` and `_`, beginning with a letter or digit',
    },
  }),
  label: text({ meaning: 'Name of the option for people.', longest: 120 }),
}
