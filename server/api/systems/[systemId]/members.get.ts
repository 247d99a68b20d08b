import { listMembers } from '../../../services/members/listMembers'

/** GET /api/systems/[systemId]/members: who has which roles. */
export default defineApiHandler('GET /api/systems/[systemId]/members', {}, ({ params }) => listMembers(params.systemId))
