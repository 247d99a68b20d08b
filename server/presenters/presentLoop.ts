import type { Loop } from '#shared/types/system'
import type { LoopRow } from '../database/models/LoopRow'

export const presentLoop = ({ id, version, systemId, code, name, axis, breakPoint, otherLoops, breakAt, loopStates, notes, position }: LoopRow): Loop =>
  ({ id, version, systemId, code, name, axis, breakPoint, otherLoops, breakAt, loopStates, notes, position })
