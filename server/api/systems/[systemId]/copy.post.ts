import { systemCopySchema } from '#shared/schemas/system'
import { copySystem } from '../../../services/systems/copySystem'

/** POST /api/systems/[systemId]/copy: copies the whole system under a new name. */
export default defineApiHandler('POST /api/systems/[systemId]/copy', { body: systemCopySchema, status: 201 }, ({ params, body, context }) => copySystem(params.systemId, body.name, context))
