import { deleteSystem } from '../../../services/systems/deleteSystem'

/** DELETE /api/systems/[systemId]: takes the system out of sight until it is restored. */
export default defineApiHandler('DELETE /api/systems/[systemId]', {}, ({ params, context }) => deleteSystem(params.systemId, context))
