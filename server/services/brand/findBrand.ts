import { AppError } from '#shared/errors/AppError'
import { Organisation } from '../../database/models/Organisation'

/** The one row of the team; the migrations put it there. */
export async function findBrand(): Promise<Organisation> {
  const row = await Organisation.findByPk(1)
  if (row === null) throw new AppError('unexpected', 'The row of the team is missing from the database.')
  return row
}
