import type { Brand } from '#shared/types/brand'
import { callApi } from './apiClient'

/** Routes of the team's brand on its reports. */
export const brandClient = {
  read: () => callApi<Brand>('GET', '/api/brand'),
  change: (fields: Omit<Brand, 'hasMark'>) => callApi<Brand>('PUT', '/api/brand', { body: fields }),
  putMark: (file: File) => callApi<Brand>('PUT', '/api/brand/mark', { body: file }),
  removeMark: () => callApi<Brand>('DELETE', '/api/brand/mark'),
  markPath: (version: number) => `/api/brand/mark?version=${version}`,
}
