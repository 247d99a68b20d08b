import type { Person } from '#shared/types/person'
import type { PersonRow } from '../database/models/PersonRow'

/** A person as others may see it; never the password's hash. */
export const presentPerson = (row: PersonRow): Person => ({
  id: row.id,
  email: row.email,
  name: row.name,
  isAdministrator: row.isAdministrator,
  disabledAt: row.disabledAt,
  invitationOpen: row.passwordHash === null,
})
