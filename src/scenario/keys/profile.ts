import { rows, text } from '../schema.ts'

/** A measured profile of offset and phase noise. */
export const profile = (meaning: string) =>
  rows({
    meaning,
    columns: [
      { name: 'offset', unit: 'Hz', min: 1, max: 1e11 },
      { name: 'phase noise', unit: 'dBc/Hz', min: -220, max: -1 },
    ],
    longest: 500,
    rising: true,
    usedBy: ['loop', 'jitter'],
  })

/** A file that holds such a profile: one column of offsets, one of phase noise, both with their unit in the header. */
export const profileFile = (meaning: string) => text({ meaning, longest: 400, usedBy: ['loop', 'jitter'] })
