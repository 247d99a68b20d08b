import { newPersonSchema } from '#shared/schemas/person'
import { invitePerson } from '../../services/people/invitePerson'

/** POST /api/people: invites a person. */
export default defineApiHandler('POST /api/people', { body: newPersonSchema, status: 201 }, ({ body, context }) => invitePerson(body, context))
