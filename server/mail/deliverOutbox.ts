import { createTransport } from 'nodemailer'
import PQueue from 'p-queue'
import { writeTransaction } from '../database/database'
import { OutboxMail } from '../database/models/OutboxMail'
import { logger } from '../log/logger'

/** After this many failures a mail stays in the outbox, to be read there. */
const mostAttempts = 10

/** One round at a time, so that no mail is sent twice. */
const rounds = new PQueue({ concurrency: 1 })

/** What stands in the kept text in the place of a link's secret once the mail is with its reader. */
const withoutSecrets = (text: string) => text.replace(/([?&]token=)[\w-]+/g, '$1(sent)')

/** Sends what waits in the outbox through WIDEBERTH_SMTP_URL; without it the mails stay there, to be read by an administrator. */
export function deliverOutbox(clock: () => Date): Promise<void> {
  return rounds.add(() => deliverAll(clock))
}

async function deliverAll(clock: () => Date): Promise<void> {
  const url = process.env.WIDEBERTH_SMTP_URL
  if (!url) return
  const waiting = (await OutboxMail.findAll({ where: { sentAt: null }, order: ['id'] })).filter(mail => mail.attempts < mostAttempts)
  if (waiting.length === 0) return
  const transport = createTransport({ url, disableFileAccess: true, disableUrlAccess: true, connectionTimeout: 10_000, socketTimeout: 20_000 }, {
    from: { name: 'Wideberth', address: process.env.WIDEBERTH_MAIL_FROM || 'wideberth@localhost' },
  })
  try {
    for (const mail of waiting) {
      try {
        await transport.sendMail({ to: { name: mail.toName, address: mail.toAddress }, subject: mail.subject, text: mail.text })
        await writeTransaction(() => mail.update({ sentAt: clock().toISOString(), error: null, attempts: mail.attempts + 1, text: withoutSecrets(mail.text) }))
      }
      catch (error) {
        const message = error instanceof Error ? error.message : String(error)
        logger.warn({ mailId: mail.id, reason: message }, 'A mail could not be sent; it stays in the outbox.')
        await writeTransaction(() => mail.update({ error: message, attempts: mail.attempts + 1 }))
      }
    }
  }
  finally {
    transport.close()
  }
}
