import { AuditEvent } from '../database/models/AuditEvent'
import { transactionContext } from '../database/transactionContext'
import { nowOf, type OpenContext } from '../services/context'
import type { AuditWord } from './auditEvents'

interface AuditFacts {
  systemId?: number
  /** the row concerned, by its id or its stored name */
  subjectId?: number | string
  /** what a reader needs to understand the event; never a secret */
  payload?: Record<string, unknown>
}

/** Writes what happened beside the change itself: throws outside a write transaction, since both stand or fall together. */
export async function recordAudit(context: OpenContext, event: AuditWord, facts: AuditFacts = {}): Promise<void> {
  if (!transactionContext.get('transaction')) throw new Error(`'${event}' must be recorded in the transaction of the change.`)
  await AuditEvent.create({
    at: nowOf(context),
    event,
    personId: context.actor?.id ?? null,
    personName: context.actor?.name ?? '',
    systemId: facts.systemId ?? null,
    subjectId: facts.subjectId === undefined ? null : String(facts.subjectId),
    payload: facts.payload ?? {},
  })
}
