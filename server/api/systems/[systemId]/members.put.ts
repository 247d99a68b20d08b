import { membersSchema } from '#shared/schemas/person'
import { replaceMembers } from '../../../services/members/replaceMembers'

/** PUT /api/systems/[systemId]/members: sets who has which roles. */
export default defineApiHandler('PUT /api/systems/[systemId]/members', { body: membersSchema }, ({ params, body, context }) => replaceMembers(params.systemId, body.members, context))
