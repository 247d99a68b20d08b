import { AppError } from '#shared/errors/AppError'
import type { AnalysedSource } from '#shared/types/source'
import type { SourceDifference } from '#shared/types/structure'
import { SourceRow } from '../../database/models/SourceRow'
import { presentSystem } from '../../presenters/presentSystem'
import { findDifferences } from '../analyses/findDifferences'
import { findCondition } from '../conditions/findCondition'
import type { OpenContext } from '../context'
import { findLoop } from '../loops/findLoop'
import { findSystem } from '../systems/findSystem'
import { analyseSources } from './analyseSources'

export interface ComparedSources {
  /** the one of record first, the others as they were made */
  sources: AnalysedSource[]
  /** how far each of the others lies from the one of record, in their order */
  differences: SourceDifference[]
}

/** All sources of a loop in a condition, analysed, and the differences of those set aside from the one of record. */
export async function compareLoopSources(loopId: number, conditionId: number, context: OpenContext): Promise<ComparedSources> {
  const [loop, condition] = [await findLoop(loopId), await findCondition(conditionId)]
  if (loop.systemId !== condition.systemId) throw new AppError('notFound', 'There is no such operating condition in this system.')
  const system = presentSystem(await findSystem(loop.systemId))
  const rows = await SourceRow.findAll({ where: { loopId, conditionId }, order: [['ofRecord', 'DESC'], 'id'] })
  const sources = await analyseSources(rows, system, context)
  const [reference, ...others] = sources
  if (!reference?.source.ofRecord) return { sources, differences: [] }
  return { sources, differences: await findDifferences(others.map(other => ({ reference, other })), system.frequencyUnit, context) }
}
