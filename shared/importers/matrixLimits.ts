/** Largest sets of matrices that are read: those the engine takes. */
export const matrixLimits = {
  states: 200,
  channels: 50,
  /** sets in one file */
  sets: 1000,
  /** lines of one table: those of as many sets of that size, and their headings */
  lines: 300_000,
} as const
