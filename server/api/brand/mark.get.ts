import { contentDisposition } from '../../http/contentDisposition'
import { readMark } from '../../services/brand/readMark'

const extensions: Record<string, string> = { 'image/png': 'png', 'image/jpeg': 'jpg', 'image/svg+xml': 'svg' }

/** GET /api/brand/mark: the mark's bytes, for an image of a page; opened by itself it can run and load nothing. No content where there is no mark. */
export default defineApiHandler('GET /api/brand/mark', {}, async ({ event }) => {
  const mark = await readMark()
  if (mark === null) {
    setResponseStatus(event, 204)
    return null
  }
  const { mediaType, bytes, sha256 } = mark
  setResponseHeaders(event, {
    'content-type': mediaType,
    'content-disposition': contentDisposition('attachment', `mark.${extensions[mediaType] ?? 'bin'}`),
    'content-security-policy': 'default-src \'none\'; style-src \'unsafe-inline\'; sandbox',
    'x-content-type-options': 'nosniff',
    'etag': `"${sha256}"`,
  })
  return bytes
})
