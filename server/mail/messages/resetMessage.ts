import type { MailMessage, MailRecipient } from '../MailMessage'
import { passwordLink } from '../passwordLink'

/** Lets a person choose a new password. */
export const resetMessage = (person: MailRecipient, token: string): MailMessage => ({
  subject: 'A new password for Wideberth',
  text: `Good day ${person.name},

somebody, we hope you, asked for a new password of your account in Wideberth.
Choose it with this link; it is good for one hour and can be used once:

${passwordLink(token)}

If it was not you, do nothing: your password stays as it is.
`,
})
