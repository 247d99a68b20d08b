import { AppError } from '#shared/errors/AppError'
import type { MemberEntry } from '#shared/schemas/person'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { MembershipRow } from '../../database/models/MembershipRow'
import { PersonRow } from '../../database/models/PersonRow'
import type { ServiceContext } from '../context'
import { listMembers, type Member } from './listMembers'

/** Sets who has which roles in a system. Throws where an address has no account, at its place in the list. */
export function replaceMembers(systemId: number, members: MemberEntry[], context: ServiceContext): Promise<Member[]> {
  return writeTransaction(async () => {
    const people = await PersonRow.findAll({ where: { email: members.map(member => member.email) } })
    const entries = members.flatMap(({ email, roles }, index) => {
      const person = people.find(candidate => candidate.email === email)
      if (!person) throw new AppError('invalidInput', `Nobody has an account with the address ${email}. An administrator can invite them.`, { path: `members[${index}].email` })
      return roles.map(role => ({ personId: person.id, systemId, role }))
    })
    if (!entries.some(entry => entry.role === 'engineer')) throw new AppError('refused', 'A system needs an engineer: nobody else may change it.', { path: 'members' })
    const before = await listMembers(systemId)
    await MembershipRow.destroy({ where: { systemId } })
    await MembershipRow.bulkCreate(entries)
    const rolesOf = (list: Member[]) => Object.fromEntries(list.map(member => [member.person.email, member.roles]))
    const after = await listMembers(systemId)
    await recordAudit(context, 'members changed', { systemId, payload: { before: rolesOf(before), after: rolesOf(after) } })
    return after
  })
}
