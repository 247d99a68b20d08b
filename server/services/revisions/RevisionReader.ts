import { can } from '#shared/access/rules'
import type { Role } from '#shared/types/person'
import type { Actor } from '../context'

/** Who reads revisions of a system: drafts are for those who may see them, the others see what was issued. */
export interface RevisionReader {
  actorId: number
  seesDrafts: boolean
}

export const revisionReader = (actor: Actor, roles: readonly Role[]): RevisionReader => ({
  actorId: actor.id,
  seesDrafts: can('see loops, data and drafts', { signedIn: true, isAdministrator: actor.isAdministrator, roles }),
})
