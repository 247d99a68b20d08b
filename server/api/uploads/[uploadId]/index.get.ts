import { contentDisposition } from '../../../http/contentDisposition'
import { readUpload } from '../../../services/uploads/readUpload'

/** GET /api/uploads/[uploadId]: the file as it came, for saving; a browser never shows it as a page. */
export default defineApiHandler('GET /api/uploads/[uploadId]', {}, async ({ event, params }) => {
  const { fileName, sha256, bytes } = await readUpload(params.uploadId)
  setResponseHeaders(event, {
    'content-type': 'application/octet-stream',
    'content-disposition': contentDisposition('attachment', fileName),
    'content-security-policy': 'default-src \'none\'; sandbox',
    'etag': `"${sha256}"`,
  })
  return bytes
})
