import { needsFirstAdministrator } from '../../services/people/setUpFirstAdministrator'

/** GET /api/auth/set-up: whether the first administrator is still to be made. */
export default defineApiHandler('GET /api/auth/set-up', {}, async () => ({ needsFirstAdministrator: await needsFirstAdministrator() }))
