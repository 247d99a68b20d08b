import type { Block } from '#shared/types/block'
import type { BlockGainRow } from '../database/models/BlockGainRow'
import type { BlockRow } from '../database/models/BlockRow'

/** `gains`: those of the conditions that are shown, of this block or of others too. */
export const presentBlock = ({ id, version, systemId, name, role, unitIn, unitOut, notes, position, definition }: BlockRow, gains: readonly BlockGainRow[]): Block => ({
  id, version, systemId, name, role, unitIn, unitOut, notes, position, definition: definition ?? null,
  byCondition: Object.fromEntries(gains.filter(gain => gain.blockId === id).map(gain => [gain.conditionId, gain.definition])),
})
