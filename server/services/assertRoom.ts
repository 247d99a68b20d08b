import { AppError } from '#shared/errors/AppError'
import { limits } from '#shared/schemas/limits'
import type { ConditionRow } from '../database/models/ConditionRow'
import type { LoopRow } from '../database/models/LoopRow'

const nouns = { loops: 'loops', operating_conditions: 'operating conditions' } as const

/** Refuses one more row, new, copied or restored, in a system that holds as many as it may. */
export async function assertRoom(model: typeof LoopRow | typeof ConditionRow, systemId: number): Promise<void> {
  if (await (model as typeof LoopRow).count({ where: { systemId } }) < limits.rows) return
  throw new AppError('refused', `A system holds at most ${limits.rows} ${nouns[model.getTableName() as keyof typeof nouns]}.`)
}
