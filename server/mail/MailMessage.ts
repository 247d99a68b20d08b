/** A mail to one person, as plain text. */
export interface MailMessage {
  subject: string
  text: string
}

export interface MailRecipient {
  name: string
  email: string
}
