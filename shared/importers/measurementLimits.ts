/** Largest file of a measured response that is read. */
export const measurementLimits = {
  /** characters; a file in ASCII has as many bytes */
  characters: 20 * 1024 * 1024,
  rows: 200_000,
  /** problems told one by one; the rest is counted */
  problems: 100,
} as const
