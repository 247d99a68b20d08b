import type { Person } from '#shared/types/person'

/** Who acts: a person signed in. */
export type Actor = Pick<Person, 'id' | 'name' | 'email' | 'isAdministrator'>

/** What every service is told beside its arguments. The transaction, if there is one, is joined by itself. */
export interface ServiceContext {
  actor: Actor
  clock: () => Date
}

/** The same where nobody need be signed in. */
export interface OpenContext {
  actor: Actor | null
  clock: () => Date
}

/** Now, as it is stored. */
export const nowOf = (context: OpenContext): string => context.clock().toISOString()
