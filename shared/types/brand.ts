export type PageSize = 'A4' | 'Letter'

export interface Brand {
  teamName: string
  /** #RRGGBB */
  accent: string
  addressLine: string
  pageSize: PageSize
  /** whether a mark is stored; its bytes are at GET /api/brand/mark */
  hasMark: boolean
  version: number
}
