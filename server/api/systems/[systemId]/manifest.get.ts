import { contentDisposition } from '../../../http/contentDisposition'
import { exportManifest } from '../../../services/manifests/exportManifest'

/** GET /api/systems/[systemId]/manifest: the whole system as one JSON text, for saving. */
export default defineApiHandler('GET /api/systems/[systemId]/manifest', {}, async ({ event, params }) => {
  const { name, text } = await exportManifest(params.systemId)
  setResponseHeaders(event, {
    'content-type': 'application/json; charset=utf-8',
    'content-disposition': contentDisposition('attachment', `${name.replace(/[\\/:*?"<>|]+/g, ' ').trim()}.json`),
  })
  return text
})
