import type { AnalysedSource, Source, SourceDefinition } from '#shared/types/source'
import { callApi } from './apiClient'

const at = (sourceId: number) => `/api/sources/${sourceId}`

/** Routes of one source of a loop's gain. */
export const sourcesClient = {
  read: (sourceId: number, signal?: AbortSignal) => callApi<AnalysedSource>('GET', at(sourceId), { signal }),
  change: (sourceId: number, fields: { version: number, name: string, definition: SourceDefinition, setAsideReason: string }) =>
    callApi<AnalysedSource>('PUT', at(sourceId), { body: fields }),
  remove: (sourceId: number) => callApi<{ id: number }>('DELETE', at(sourceId)),
  restore: (sourceId: number) => callApi<Source>('POST', `${at(sourceId)}/restore`),
  makeOfRecord: (sourceId: number, setAsideReason: string) => callApi<Source>('POST', `${at(sourceId)}/of-record`, { body: { setAsideReason } }),
}
