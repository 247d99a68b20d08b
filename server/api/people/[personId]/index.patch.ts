import { personChangeSchema } from '#shared/schemas/person'
import { updatePerson } from '../../../services/people/updatePerson'

/** PATCH /api/people/[personId]: name, administrator or not, disabled or not. */
export default defineApiHandler('PATCH /api/people/[personId]', { body: personChangeSchema }, ({ params, body, context }) => updatePerson(params.personId, body, context))
