import { limits } from '#shared/schemas/limits'
import { readJsonText } from '../../http/readJsonBody'
import { importManifest } from '../../services/manifests/importManifest'

/** POST /api/manifests: makes a system of a manifest, the body being its text. */
export default defineApiHandler('POST /api/manifests', { status: 201 }, async ({ event, context }) =>
  importManifest(await readJsonText(event, limits.manifestBytes), context))
