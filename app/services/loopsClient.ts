import type { BoardCell, Loop, OperatingCondition, Parameter, System } from '#shared/types/system'
import type { Criterion } from '#shared/types/criterion'
import type { Role } from '#shared/types/person'
import type { Block } from '#shared/types/block'
import type { AnalysedSource, Source, SourceDefinition } from '#shared/types/source'
import type { SourceDifference } from '#shared/types/structure'
import type { LoopFields } from './systemsClient'
import { callApi } from './apiClient'

export interface LoopDetail {
  loop: Loop
  /** all of the system, in their order */
  loops: Pick<Loop, 'id' | 'code' | 'name'>[]
  system: System
  conditions: OperatingCondition[]
  parameters: Parameter[]
  blocks: Block[]
  criteria: Criterion[]
  sources: Source[]
  cells: BoardCell[]
  roles: Role[]
}

/** All sources of a loop in one condition, analysed, and how far each lies from the one of record. */
export interface ComparedSources {
  sources: AnalysedSource[]
  differences: SourceDifference[]
}

export interface NewSource {
  conditionIds: number[]
  name: string
  definition: SourceDefinition
  ofRecord: boolean
  setAsideReason: string
}

const at = (loopId: number) => `/api/loops/${loopId}`

/** Routes of one loop. */
export const loopsClient = {
  read: (loopId: number) => callApi<LoopDetail>('GET', at(loopId)),
  change: (loopId: number, fields: Partial<LoopFields> & { version: number }) => callApi<Loop>('PATCH', at(loopId), { body: fields }),
  remove: (loopId: number) => callApi<{ id: number }>('DELETE', at(loopId)),
  restore: (loopId: number) => callApi<Loop>('POST', `${at(loopId)}/restore`),
  copy: (loopId: number, fields: { code: string, name: string }) => callApi<Loop>('POST', `${at(loopId)}/copy`, { body: fields }),
  compareSources: (loopId: number, conditionId: number, signal?: AbortSignal) => callApi<ComparedSources>('GET', `${at(loopId)}/conditions/${conditionId}/sources`, { signal }),
  createSources: (loopId: number, fields: NewSource) => callApi<Source[]>('POST', `${at(loopId)}/sources`, { body: fields }),
}
