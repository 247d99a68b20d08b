import { AppError } from '#shared/errors/AppError'
import type { PersonChange } from '#shared/schemas/person'
import type { Person } from '#shared/types/person'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { PersonRow } from '../../database/models/PersonRow'
import { SessionRow } from '../../database/models/SessionRow'
import { presentPerson } from '../../presenters/presentPerson'
import { nowOf, type ServiceContext } from '../context'
import { findPerson } from './findPerson'

/**
 * Changes a person's name, makes it an administrator or not, disables or enables it; disabling ends its sessions.
 * Throws 'refused' where nobody would be left to administer.
 */
export function updatePerson(personId: number, change: PersonChange, context: ServiceContext): Promise<Person> {
  return writeTransaction(async () => {
    const person = await findPerson(personId)
    const { name, isAdministrator, disabled } = change
    await person.update({
      ...(name !== undefined && { name }),
      ...(isAdministrator !== undefined && { isAdministrator }),
      ...(disabled !== undefined && { disabledAt: disabled ? person.disabledAt ?? nowOf(context) : null }),
    })
    if (await PersonRow.count({ where: { isAdministrator: true, disabledAt: null } }) === 0) {
      throw new AppError('refused', 'There must be an administrator whose account is not disabled.', { path: disabled ? 'disabled' : 'isAdministrator' })
    }
    if (disabled) await SessionRow.destroy({ where: { personId } })
    await recordAudit(context, 'person changed', { subjectId: personId, payload: { ...change } })
    return presentPerson(person)
  })
}
