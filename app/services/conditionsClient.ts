import type { BlockGain } from '#shared/types/block'
import type { OperatingCondition } from '#shared/types/system'
import type { ConditionFields } from './systemsClient'
import { callApi } from './apiClient'

const at = (conditionId: number) => `/api/conditions/${conditionId}`

/** Routes of one operating condition. */
export const conditionsClient = {
  /** of every block of the system, where it could be made out, by name */
  gains: (conditionId: number) => callApi<Record<string, BlockGain>>('GET', `${at(conditionId)}/gains`),
  change: (conditionId: number, fields: Partial<ConditionFields> & { version: number }) =>
    callApi<OperatingCondition>('PATCH', at(conditionId), { body: fields }),
  remove: (conditionId: number) => callApi<{ id: number }>('DELETE', at(conditionId)),
  restore: (conditionId: number) => callApi<OperatingCondition>('POST', `${at(conditionId)}/restore`),
  copy: (conditionId: number, fields: { code: string, name: string }) => callApi<OperatingCondition>('POST', `${at(conditionId)}/copy`, { body: fields }),
}
