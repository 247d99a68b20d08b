import { OutboxMail } from '../../database/models/OutboxMail'

export interface OutboxEntry {
  id: number
  to: string
  subject: string
  text: string
  createdAt: string
  /** null while it waits, or for good where no mail server is set */
  sentAt: string | null
}

/** The newest mails first, at most 200. */
export async function listOutbox(): Promise<OutboxEntry[]> {
  const rows = await OutboxMail.findAll({ order: [['id', 'DESC']], limit: 200 })
  return rows.map(({ id, toName, toAddress, subject, text, createdAt, sentAt }) => ({ id, to: `${toName} <${toAddress}>`, subject, text, createdAt, sentAt }))
}
