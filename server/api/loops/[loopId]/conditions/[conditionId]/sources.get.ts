import { compareLoopSources } from '../../../../../services/sources/compareLoopSources'

/** GET /api/loops/[loopId]/conditions/[conditionId]/sources: all sources there, and how far each lies from the one of record. */
export default defineApiHandler('GET /api/loops/[loopId]/conditions/[conditionId]/sources', {}, ({ params, context }) => compareLoopSources(params.loopId, params.conditionId, context))
