import { readSystem } from '../../../services/systems/readSystem'

/** GET /api/systems/[systemId]: the system with its loops, conditions and criteria, and the roles of the person. */
export default defineApiHandler('GET /api/systems/[systemId]', {}, async ({ params, roles }) => ({ ...await readSystem(params.systemId), roles }))
