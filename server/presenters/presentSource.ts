import type { Source } from '#shared/types/source'
import type { SourceRow } from '../database/models/SourceRow'

export const presentSource = ({ id, version, loopId, conditionId, name, kind, definition, ofRecord, setAsideReason }: SourceRow): Source =>
  ({ id, version, loopId, conditionId, name, kind, definition, ofRecord, setAsideReason })
