import { Op } from 'sequelize'
import { AppError } from '#shared/errors/AppError'
import type { ConditionRow } from '../database/models/ConditionRow'
import type { LoopRow } from '../database/models/LoopRow'

const nouns = { loops: 'loop', operating_conditions: 'operating condition' } as const

/** Refuses a code that another loop, or condition, of the system has; deleted ones do not count. */
export async function assertCodeFree(model: typeof LoopRow | typeof ConditionRow, systemId: number, code: string, exceptId?: number): Promise<void> {
  const where = { systemId, code, ...(exceptId !== undefined && { id: { [Op.ne]: exceptId } }) }
  const taken = await (model as typeof LoopRow).count({ where })
  if (taken === 0) return
  const noun = nouns[model.getTableName() as keyof typeof nouns]
  throw new AppError('conflict', `This system has another ${noun} with the code ${code}.`, { path: 'code' })
}
