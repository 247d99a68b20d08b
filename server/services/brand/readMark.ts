import { AppError } from '#shared/errors/AppError'
import { Mark } from '../../database/models/Mark'

/** The team's mark as it was made safe; throws 'not found' where there is none. */
export async function readMark(): Promise<{ mediaType: string, bytes: Buffer, sha256: string }> {
  const mark = await Mark.findByPk(1)
  if (mark === null) throw new AppError('notFound', 'No mark is stored.')
  return { mediaType: mark.mediaType, bytes: mark.bytes, sha256: mark.sha256 }
}
