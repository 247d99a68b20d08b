import { SourceRow } from '../../database/models/SourceRow'

/** The sources of record of these loops in these conditions. */
export const listSourcesOfRecord = (loopIds: number[], conditionIds: number[]): Promise<SourceRow[]> =>
  SourceRow.findAll({ where: { loopId: loopIds, conditionId: conditionIds, ofRecord: true }, order: ['id'] })
