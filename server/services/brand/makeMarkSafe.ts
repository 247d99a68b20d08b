import { fileTypeFromBuffer } from 'file-type'
import { AppError } from '#shared/errors/AppError'
import { markLimits } from '#shared/schemas/brand'
import type { ImageSize } from './readImageSize'
import { sizeOfJpeg, sizeOfPng } from './readImageSize'
import { sanitiseSvg } from './sanitiseSvg'

export interface SafeMark {
  mediaType: 'image/png' | 'image/jpeg' | 'image/svg+xml'
  bytes: Buffer
}

const refused = (message: string) => new AppError('invalidInput', message, { path: 'mark' })

function assertSize(size: ImageSize | null): void {
  if (size === null || size.width === 0 || size.height === 0) throw refused('This image is damaged: its size cannot be read.')
  if (size.width > markLimits.pixels || size.height > markLimits.pixels) {
    throw refused(`This image has ${size.width} x ${size.height} pixels; at most ${markLimits.pixels} on each side.`)
  }
}

/**
 * A mark that a report may carry: PNG or JPEG as it is, SVG with everything taken out that could run or load. The kind is told by the content, not
 * by a name. Throws 'too large' over 1 MB and 'invalid input' for anything else.
 */
export async function makeMarkSafe(bytes: Buffer): Promise<SafeMark> {
  if (bytes.length === 0) throw refused('The file is empty.')
  if (bytes.length > markLimits.bytes) throw new AppError('tooLarge', 'The mark may hold 1 MB at most.', { path: 'mark' })
  const type = await fileTypeFromBuffer(bytes)
  if (type?.mime === 'image/png') {
    assertSize(sizeOfPng(bytes))
    return { mediaType: type.mime, bytes }
  }
  if (type?.mime === 'image/jpeg') {
    assertSize(sizeOfJpeg(bytes))
    return { mediaType: type.mime, bytes }
  }
  const text = bytes.toString('utf8')
  if ((type === undefined || type.mime === 'application/xml') && /<svg[\s>]/i.test(text)) {
    return { mediaType: 'image/svg+xml', bytes: Buffer.from(await sanitiseSvg(text), 'utf8') }
  }
  throw refused(`The mark must be a PNG, JPEG or SVG image${type ? `; this is ${type.mime}` : ''}.`)
}
