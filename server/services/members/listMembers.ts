import type { Person, Role } from '#shared/types/person'
import { MembershipRow } from '../../database/models/MembershipRow'
import { PersonRow } from '../../database/models/PersonRow'
import { presentPerson } from '../../presenters/presentPerson'

export interface Member {
  person: Person
  roles: Role[]
}

const order: Role[] = ['engineer', 'checker', 'approver', 'customer']

/** Who has which roles in a system, by name. */
export async function listMembers(systemId: number): Promise<Member[]> {
  const memberships = await MembershipRow.findAll({ where: { systemId } })
  const people = await PersonRow.findAll({ where: { id: memberships.map(membership => membership.personId) }, order: ['name', 'id'] })
  return people.map(person => ({
    person: presentPerson(person),
    roles: order.filter(role => memberships.some(membership => membership.personId === person.id && membership.role === role)),
  }))
}
