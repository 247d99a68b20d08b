import type { BlockRow } from '../database/models/BlockRow'
import type { ConditionRow } from '../database/models/ConditionRow'
import type { LoopRow } from '../database/models/LoopRow'
import type { ParameterRow } from '../database/models/ParameterRow'

/** The position after the last row of a system's list. */
export async function nextPosition(model: typeof LoopRow | typeof ConditionRow | typeof BlockRow | typeof ParameterRow, systemId: number): Promise<number> {
  const last: number | null = await (model as typeof LoopRow).max('position', { where: { systemId } })
  return (last ?? 0) + 1
}
