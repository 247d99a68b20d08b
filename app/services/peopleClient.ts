import type { Person } from '#shared/types/person'
import { callApi } from './apiClient'

export interface OutboxMail {
  id: number
  to: string
  subject: string
  text: string
  createdAt: string
  sentAt: string | null
}

/** Routes of people and of the mail written to them; for administrators. */
export const peopleClient = {
  list: () => callApi<Person[]>('GET', '/api/people'),
  invite: (fields: { name: string, email: string, isAdministrator: boolean }) => callApi<Person>('POST', '/api/people', { body: fields }),
  change: (personId: number, fields: { name?: string, isAdministrator?: boolean, disabled?: boolean }) => callApi<Person>('PATCH', `/api/people/${personId}`, { body: fields }),
  inviteAgain: (personId: number) => callApi<Record<string, never>>('POST', `/api/people/${personId}/invitation`),
  outbox: () => callApi<OutboxMail[]>('GET', '/api/outbox'),
}
