import type { Person } from '#shared/types/person'
import { PersonRow } from '../../database/models/PersonRow'
import { presentPerson } from '../../presenters/presentPerson'

/** Every account, by name. */
export const listPeople = async (): Promise<Person[]> => (await PersonRow.findAll({ order: ['name', 'id'] })).map(presentPerson)
