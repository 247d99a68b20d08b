import { Op } from 'sequelize'
import { AppError } from '#shared/errors/AppError'
import { BlockRow } from '../../database/models/BlockRow'
import { ParameterRow } from '../../database/models/ParameterRow'

/** Refuses a name that another block of the system has, or a parameter: expressions could not tell them apart. */
export async function assertBlockNameFree(systemId: number, name: string, exceptId?: number): Promise<void> {
  const where = { systemId, name, ...(exceptId !== undefined && { id: { [Op.ne]: exceptId } }) }
  if (await BlockRow.count({ where }) > 0) throw new AppError('conflict', `This system has another block with the name ${name}.`, { path: 'name' })
  if (await ParameterRow.count({ where: { systemId, name } }) > 0) throw new AppError('conflict', `This system has a parameter with the name ${name}.`, { path: 'name' })
}
