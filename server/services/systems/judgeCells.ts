import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import { breakPointDisagreements, cellKey } from '#shared/workflow/breakPointDisagreements'
import type { Criterion } from '#shared/types/criterion'
import type { BoardCell, Loop, System } from '#shared/types/system'
import type { OpenContext } from '../context'
import { analyseSources } from '../sources/analyseSources'
import { listSourcesOfRecord } from '../sources/listSourcesOfRecord'

/**
 * Every loop in every condition by its source of record, analysed and judged, in order of loops, then conditions.
 *
 * @param all the loops of the system: those that state one of `loops` as closed are analysed too, to tell where their verdicts contradict
 */
export async function judgeCells(
  system: Pick<System, 'id' | 'frequencyUnit'>, loops: readonly Loop[], conditionIds: number[], criteria: Criterion[], all: readonly Loop[], context: OpenContext,
): Promise<BoardCell[]> {
  const witnesses = all.filter(other => !loops.some(({ id }) => id === other.id) && loops.some(loop => closes(loop, other) && closes(other, loop)))
  const looked = [...loops, ...witnesses]
  const analysed = await analyseSources(await listSourcesOfRecord(looked.map(loop => loop.id), conditionIds), system, context)
  const byCell = new Map(analysed.map(entry => [cellKey(entry.source.loopId, entry.source.conditionId), entry]))
  const cells = analysed.map(({ source, analysis }) => ({ loopId: source.loopId, conditionId: source.conditionId, analysis }))
  const disagreements = breakPointDisagreements({ loops: looked, cells })
  return loops.flatMap(({ id: loopId }) => conditionIds.map((conditionId): BoardCell => {
    const key = cellKey(loopId, conditionId)
    const entry = byCell.get(key)
    const analysis = entry?.analysis ?? null
    return {
      loopId,
      conditionId,
      source: entry ? { id: entry.source.id, name: entry.source.name, kind: entry.source.kind } : null,
      analysis,
      failure: entry?.failure ?? null,
      disagreement: disagreements.get(key) ?? null,
      judgement: judgeAnalysis(analysis, criteria),
    }
  }))
}

const closes = ({ loopStates }: Loop, other: Loop): boolean => loopStates.some(({ loopId, state }) => loopId === other.id && state === 'closed')
