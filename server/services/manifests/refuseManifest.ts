import { AppError } from '#shared/errors/AppError'
import type { InputFault } from '#shared/schemas/readBySchema'

/** Faults that one refusal tells at most. */
const mostTold = 200

/** The refusal of a manifest: its first fault in words, all of them (the first 200 where there are more) as details. */
export function refuseManifest(faults: InputFault[]): AppError {
  const [first] = faults
  if (first === undefined) throw new Error('A manifest without a fault is not refused.')
  const more = faults.length - mostTold
  const told = faults.slice(0, mostTold)
  if (more > 0) told.push({ path: '', message: `And ${more} more.` })
  return new AppError('invalidInput', first.message, { ...(first.path !== '' && { path: first.path }), details: { faults: told } })
}
