import type { BoardCell, Loop, OperatingCondition, Parameter, System } from '#shared/types/system'
import type { Criterion } from '#shared/types/criterion'
import type { Role } from '#shared/types/person'
import type { Source, SourceDefinition } from '#shared/types/source'
import type { LoopFields } from './systemsClient'
import { callApi } from './apiClient'

export interface LoopDetail {
  loop: Loop
  system: System
  conditions: OperatingCondition[]
  parameters: Parameter[]
  criteria: Criterion[]
  sources: Source[]
  cells: BoardCell[]
  roles: Role[]
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
  createSources: (loopId: number, fields: NewSource) => callApi<Source[]>('POST', `${at(loopId)}/sources`, { body: fields }),
}
