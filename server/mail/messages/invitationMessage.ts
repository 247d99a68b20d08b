import type { MailMessage, MailRecipient } from '../MailMessage'
import { passwordLink } from '../passwordLink'

/** Invites a person to set a first password. */
export const invitationMessage = (person: MailRecipient, invitedBy: string, token: string): MailMessage => ({
  subject: 'Your account in Wideberth',
  text: `Good day ${person.name},

${invitedBy} has made an account for you in Wideberth, where the stability margins of a system's loops are kept and reported.
Choose your password with this link; it is good for seven days and can be used once:

${passwordLink(token)}

If you did not expect this mail, leave the link alone.
`,
})
