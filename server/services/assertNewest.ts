import { AppError } from '#shared/errors/AppError'

/** Refuses a change made from an older version of a row; the newest goes along, so that both can be compared. */
export function assertNewest(row: { version: number }, version: number, current: unknown): void {
  if (row.version === version) return
  throw new AppError('conflict', 'Somebody else has changed this in the meantime. Compare with the newest state and save again.', { path: 'version', details: { current } })
}
