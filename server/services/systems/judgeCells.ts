import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import type { Criterion } from '#shared/types/criterion'
import type { BoardCell, System } from '#shared/types/system'
import type { OpenContext } from '../context'
import { analyseSources } from '../sources/analyseSources'
import { listSourcesOfRecord } from '../sources/listSourcesOfRecord'

/** Every loop in every condition by its source of record, analysed and judged, in order of loops, then conditions. */
export async function judgeCells(
  system: Pick<System, 'id' | 'frequencyUnit'>, loopIds: number[], conditionIds: number[], criteria: Criterion[], context: OpenContext,
): Promise<BoardCell[]> {
  const analysed = await analyseSources(await listSourcesOfRecord(loopIds, conditionIds), system, context)
  const byCell = new Map(analysed.map(entry => [`${entry.source.loopId} ${entry.source.conditionId}`, entry]))
  return loopIds.flatMap(loopId => conditionIds.map((conditionId): BoardCell => {
    const entry = byCell.get(`${loopId} ${conditionId}`)
    const analysis = entry?.analysis ?? null
    return {
      loopId,
      conditionId,
      source: entry ? { id: entry.source.id, name: entry.source.name, kind: entry.source.kind } : null,
      analysis,
      failure: entry?.failure ?? null,
      disagreement: null,
      judgement: judgeAnalysis(analysis, criteria),
    }
  }))
}
