import { defaultCriteria } from '#shared/analysis/criteria/defaultCriteria'
import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import type { LoopAnalysis } from '#shared/types/analysis'
import type { BoardCell, Loop, OperatingCondition } from '#shared/types/system'

export function buildCell(loopId: number, conditionId: number, analysis: LoopAnalysis | null, fields: Partial<BoardCell> = {}): BoardCell {
  return {
    loopId, conditionId, analysis,
    source: { id: 100 * loopId + conditionId, name: 'design model', kind: 'coefficients' },
    failure: null,
    disagreement: null,
    judgement: judgeAnalysis(analysis, defaultCriteria),
    ...fields,
  }
}

export const buildLoop = (id: number, code: string): Loop =>
  ({ id, version: 1, systemId: 1, code, name: `Loop ${code}`, axis: '', breakPoint: 'command', otherLoops: 'closed', breakAt: null, loopStates: [], notes: '', position: id })

export const buildCondition = (id: number, code: string): OperatingCondition =>
  ({ id, version: 1, systemId: 1, code, name: `Condition ${code}`, coordinates: [], tags: [], notes: '', position: id })
