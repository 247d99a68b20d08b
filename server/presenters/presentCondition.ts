import type { OperatingCondition } from '#shared/types/system'
import type { ConditionRow } from '../database/models/ConditionRow'

export const presentCondition = ({ id, version, systemId, code, name, coordinates, tags, notes, position }: ConditionRow): OperatingCondition =>
  ({ id, version, systemId, code, name, coordinates, tags, notes, position })
