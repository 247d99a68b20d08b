import { AppError } from '#shared/errors/AppError'
import type { Role } from '#shared/types/person'
import { can, type Action } from '#shared/access/rules'
import { MembershipRow } from '../database/models/MembershipRow'
import type { Actor } from '../services/context'
import { systemOfParam } from './systemOfParam'

export interface Authorization {
  /** the system the route is about, null where it is about none */
  systemId: number | null
  /** the roles the person holds in it */
  roles: Role[]
}

const notFound = () => new AppError('notFound', 'There is nothing here, or nothing that you may see.')

/** The one system that all of a route's ids belong to; throws 'not found' where one has none or they differ. */
async function systemOf(ids: Record<string, number>, deleted: boolean): Promise<number | null> {
  let systemId: number | null = null
  for (const [name, id] of Object.entries(ids)) {
    const find = systemOfParam[name]
    if (!find) continue
    const found = await find(id, deleted)
    if (found === null || (systemId !== null && systemId !== found)) throw notFound()
    systemId = found
  }
  return systemId
}

/**
 * Loads the facts and asks the rules whether this person may do this; throws 'signed out', 'not found' (also for a system
 * in which the person has no role) or 'not allowed' otherwise.
 */
export async function authorize(action: Action, actor: Actor | null, ids: Record<string, number>, deleted: boolean): Promise<Authorization> {
  const signedIn = actor !== null
  // Nobody signed out learns whether a row exists: the first question is whether signing in could help at all.
  if (!signedIn) {
    if (!can(action, { signedIn, isAdministrator: false, roles: [] })) throw new AppError('signedOut', 'Sign in to go on.')
    return { systemId: null, roles: [] }
  }
  const systemId = await systemOf(ids, deleted)
  const roles = systemId === null ? [] : await rolesIn(actor.id, systemId)
  const { isAdministrator } = actor
  if (can(action, { signedIn, isAdministrator, roles })) return { systemId, roles }
  if (systemId !== null && roles.length === 0 && !isAdministrator) throw notFound()
  throw new AppError('notAllowed', 'Your role does not allow this.')
}

/** The roles a person holds in a system. */
export async function rolesIn(personId: number, systemId: number): Promise<Role[]> {
  const memberships = await MembershipRow.findAll({ where: { personId, systemId } })
  const order: Role[] = ['engineer', 'checker', 'approver', 'customer']
  return order.filter(role => memberships.some(membership => membership.role === role))
}
