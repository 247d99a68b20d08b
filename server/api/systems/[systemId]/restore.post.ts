import { restoreSystem } from '../../../services/systems/restoreSystem'

/** POST /api/systems/[systemId]/restore: brings a deleted system back. */
export default defineApiHandler('POST /api/systems/[systemId]/restore', {}, ({ params, context }) => restoreSystem(params.systemId, context))
