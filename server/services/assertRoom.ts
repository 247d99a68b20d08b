import { AppError } from '#shared/errors/AppError'
import { limits } from '#shared/schemas/limits'
import type { BlockRow } from '../database/models/BlockRow'
import type { ConditionRow } from '../database/models/ConditionRow'
import type { LoopRow } from '../database/models/LoopRow'

const kinds = { loops: ['loops', limits.rows], operating_conditions: ['operating conditions', limits.rows], blocks: ['blocks', limits.blocks] } as const

/** Refuses one more row, new, copied or restored, in a system that holds as many as it may. */
export async function assertRoom(model: typeof LoopRow | typeof ConditionRow | typeof BlockRow, systemId: number): Promise<void> {
  const [noun, most] = kinds[model.getTableName() as keyof typeof kinds]
  if (await (model as typeof LoopRow).count({ where: { systemId } }) < most) return
  throw new AppError('refused', `A system holds at most ${most} ${noun}.`)
}
