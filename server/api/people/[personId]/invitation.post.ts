import { sendInvitation } from '../../../services/people/sendInvitation'

/** POST /api/people/[personId]/invitation: sends the invitation again. */
export default defineApiHandler('POST /api/people/[personId]/invitation', {}, async ({ params, context }) => {
  await sendInvitation(params.personId, context)
  return {}
})
