import { limits } from '#shared/schemas/limits'
import { readOneFile } from '../../../http/readOneFile'
import { storeUpload } from '../../../services/uploads/storeUpload'

/** POST /api/systems/[systemId]/uploads: keeps a file, to be named by a measured source. */
export default defineApiHandler('POST /api/systems/[systemId]/uploads', { status: 201 }, async ({ event, params, context }) =>
  storeUpload(params.systemId, await readOneFile(event, limits.uploadBytes), context))
