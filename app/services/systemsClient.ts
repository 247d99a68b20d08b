import type { Board, Loop, OperatingCondition, Parameter, System, SystemSummary } from '#shared/types/system'
import type { Block } from '#shared/types/block'
import type { Criterion } from '#shared/types/criterion'
import type { Person, Role } from '#shared/types/person'
import type { Upload } from '#shared/types/source'
import { callApi } from './apiClient'

export type SystemFields = Pick<System, 'name' | 'customer' | 'documentNumber' | 'frequencyUnit' | 'description'>
export type LoopFields = Pick<Loop, 'code' | 'name' | 'axis' | 'breakPoint' | 'otherLoops' | 'breakAt' | 'loopStates' | 'notes'>
export type ConditionFields = Pick<OperatingCondition, 'code' | 'name' | 'coordinates' | 'tags' | 'notes'>
export type ParameterFields = Pick<Parameter, 'name' | 'unit' | 'notes' | 'values'> & { id?: number, version?: number }

export interface SystemDetail {
  system: System
  loops: Loop[]
  conditions: OperatingCondition[]
  criteria: Criterion[]
  blocks: Block[]
  roles: Role[]
}

export interface Member {
  person: Person
  roles: Role[]
}

const at = (systemId: number) => `/api/systems/${systemId}`

/** Routes of systems and of the lists that belong to one. */
export const systemsClient = {
  list: () => callApi<SystemSummary[]>('GET', '/api/systems'),
  create: (fields: SystemFields) => callApi<System>('POST', '/api/systems', { body: fields }),
  read: (systemId: number) => callApi<SystemDetail>('GET', at(systemId)),
  change: (systemId: number, fields: Partial<SystemFields> & { version: number }) => callApi<System>('PATCH', at(systemId), { body: fields }),
  remove: (systemId: number) => callApi<{ id: number }>('DELETE', at(systemId)),
  restore: (systemId: number) => callApi<System>('POST', `${at(systemId)}/restore`),
  copy: (systemId: number, name: string) => callApi<System>('POST', `${at(systemId)}/copy`, { body: { name } }),
  importManifest: (file: File) => callApi<System>('POST', '/api/manifests', { body: new Blob([file], { type: 'application/json' }) }),
  manifestAddress: (systemId: number) => `${at(systemId)}/manifest`,
  board: (systemId: number) => callApi<Board>('GET', `${at(systemId)}/board`),
  putCriteria: (systemId: number, criteria: Criterion[]) => callApi<Criterion[]>('PUT', `${at(systemId)}/criteria`, { body: { criteria } }),
  members: (systemId: number) => callApi<Member[]>('GET', `${at(systemId)}/members`),
  putMembers: (systemId: number, members: { email: string, roles: Role[] }[]) => callApi<Member[]>('PUT', `${at(systemId)}/members`, { body: { members } }),
  createLoop: (systemId: number, fields: LoopFields) => callApi<Loop>('POST', `${at(systemId)}/loops`, { body: fields }),
  orderLoops: (systemId: number, ids: number[]) => callApi<{ ids: number[] }>('PUT', `${at(systemId)}/loops/order`, { body: { ids } }),
  createCondition: (systemId: number, fields: ConditionFields) => callApi<OperatingCondition>('POST', `${at(systemId)}/conditions`, { body: fields }),
  orderConditions: (systemId: number, ids: number[]) => callApi<{ ids: number[] }>('PUT', `${at(systemId)}/conditions/order`, { body: { ids } }),
  parameters: (systemId: number) => callApi<Parameter[]>('GET', `${at(systemId)}/parameters`),
  putParameters: (systemId: number, parameters: ParameterFields[], madeFrom: number[]) => callApi<Parameter[]>('PUT', `${at(systemId)}/parameters`, { body: { parameters, madeFrom } }),
  upload: (systemId: number, file: File) => {
    const body = new FormData()
    body.append('file', file)
    return callApi<Upload>('POST', `${at(systemId)}/uploads`, { body })
  },
}
