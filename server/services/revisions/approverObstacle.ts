import { rolesIn } from '../../access/authorize'
import { PersonRow } from '../../database/models/PersonRow'

/** Why the approver who asked for an issue can no longer give it; null while they can. Asked at its end, for rendering takes its time. */
export async function approverObstacle(personId: number, systemId: number): Promise<string | null> {
  const person = await PersonRow.findByPk(personId, { rejectOnEmpty: true })
  const isApprover = person.disabledAt === null && (await rolesIn(personId, systemId)).includes('approver')
  return isApprover ? null : `${person.name} is no approver of this system any more: another approver has to issue it.`
}
