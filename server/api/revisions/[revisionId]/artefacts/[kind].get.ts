import { Readable } from 'node:stream'
import { AppError } from '#shared/errors/AppError'
import { artefactKindSchema, artefactQuerySchema } from '#shared/schemas/revision'
import { contentDisposition } from '../../../../http/contentDisposition'
import { documentPolicy } from '../../../../http/documentPolicy'
import { readArtefact } from '../../../../services/revisions/readArtefact'
import { revisionReader } from '../../../../services/revisions/RevisionReader'

/** GET /api/revisions/[revisionId]/artefacts/[kind]: the stored bytes, streamed; `html` in place cannot run or load anything. */
export default defineApiHandler('GET /api/revisions/[revisionId]/artefacts/[kind]', { query: artefactQuerySchema }, async ({ event, params, query, actor, roles }) => {
  const kind = artefactKindSchema.safeParse(params.kind)
  if (!kind.success) throw new AppError('notFound', 'A revision has the artefacts html, pdf and zip.')
  const artefact = await readArtefact(params.revisionId, kind.data, query.edition, revisionReader(actor, roles))
  const etag = `"${artefact.sha256}"`
  setResponseHeaders(event, {
    'content-type': artefact.mediaType,
    'content-length': artefact.size,
    'content-disposition': contentDisposition(query.disposition, artefact.fileName),
    'x-content-type-options': 'nosniff',
    'cache-control': 'private, no-cache',
    'etag': etag,
    ...(kind.data === 'html' && { 'content-security-policy': documentPolicy }),
  })
  if (getRequestHeader(event, 'if-none-match') === etag) {
    removeResponseHeader(event, 'content-length')
    setResponseStatus(event, 304)
    return ''
  }
  return sendStream(event, Readable.from(artefact.bytes()))
})
