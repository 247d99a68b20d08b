import type { SourceRow } from '../../database/models/SourceRow'
import type { SystemRow } from '../../database/models/SystemRow'
import { findLoop } from '../loops/findLoop'
import { findSystem } from '../systems/findSystem'

/** The system a source belongs to, by its loop. */
export const findSystemOfSource = async (source: SourceRow): Promise<SystemRow> => findSystem((await findLoop(source.loopId)).systemId)
