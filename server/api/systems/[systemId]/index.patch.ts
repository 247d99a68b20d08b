import { systemChangeSchema } from '#shared/schemas/system'
import { updateSystem } from '../../../services/systems/updateSystem'

/** PATCH /api/systems/[systemId]: changes the named fields. */
export default defineApiHandler('PATCH /api/systems/[systemId]', { body: systemChangeSchema }, ({ params, body, context }) => updateSystem(params.systemId, body, context))
