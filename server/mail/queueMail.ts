import { emailField } from '#shared/schemas/person'
import type { database } from '../database/database'
import { OutboxMail } from '../database/models/OutboxMail'
import { transactionContext } from '../database/transactionContext'
import { logger } from '../log/logger'
import { nowOf, type OpenContext } from '../services/context'
import { deliverOutbox } from './deliverOutbox'
import type { MailMessage, MailRecipient } from './MailMessage'

/**
 * Puts a mail into the outbox in the transaction of its reason; it is sent once that has committed, where a mail server is set.
 * Throws on an address that could be read as more than one.
 */
export async function queueMail(to: MailRecipient, message: MailMessage, context: OpenContext): Promise<void> {
  const toAddress = emailField.parse(to.email)
  await OutboxMail.create({ toName: to.name, toAddress, ...message, createdAt: nowOf(context), sentAt: null, attempts: 0, error: null })
  const transaction = transactionContext.get('transaction') as Awaited<ReturnType<ReturnType<typeof database>['transaction']>> | undefined
  if (!transaction) throw new Error('A mail must be queued in the transaction of its reason.')
  transaction.afterCommit(() => {
    transactionContext.runFresh(() => {
      deliverOutbox(context.clock).catch((error: unknown) => logger.error({ err: error }, 'The outbox could not be sent.'))
    })
  })
}
