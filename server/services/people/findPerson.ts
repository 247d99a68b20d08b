import { AppError } from '#shared/errors/AppError'
import { PersonRow } from '../../database/models/PersonRow'

/** A person by id; throws 'not found'. */
export async function findPerson(personId: number): Promise<PersonRow> {
  const person = await PersonRow.findByPk(personId)
  if (person === null) throw new AppError('notFound', 'There is no such person.')
  return person
}
