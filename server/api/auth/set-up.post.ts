import { firstAdministratorSchema } from '#shared/schemas/signIn'
import { setUpFirstAdministrator } from '../../services/people/setUpFirstAdministrator'

/** POST /api/auth/set-up: makes the first administrator, only while nobody has an account. */
export default defineApiHandler('POST /api/auth/set-up', { body: firstAdministratorSchema }, async ({ body, context }) => {
  await setUpFirstAdministrator(body, context)
  return {}
})
