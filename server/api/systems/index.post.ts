import { newSystemSchema } from '#shared/schemas/system'
import { createSystem } from '../../services/systems/createSystem'

/** POST /api/systems: makes a system. */
export default defineApiHandler('POST /api/systems', { body: newSystemSchema, status: 201 }, ({ body, context }) => createSystem(body, context))
