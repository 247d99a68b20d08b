import { Mark } from '../../database/models/Mark'

/** The team's mark as it was made safe; null where there is none. */
export async function readMark(): Promise<{ mediaType: string, bytes: Buffer, sha256: string } | null> {
  const mark = await Mark.findByPk(1)
  return mark === null ? null : { mediaType: mark.mediaType, bytes: mark.bytes, sha256: mark.sha256 }
}
