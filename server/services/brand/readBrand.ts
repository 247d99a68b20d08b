import type { Brand } from '#shared/types/brand'
import { Mark } from '../../database/models/Mark'
import type { Organisation } from '../../database/models/Organisation'
import { findBrand } from './findBrand'

export const presentBrand = async ({ teamName, accent, addressLine, pageSize, version }: Organisation): Promise<Brand> =>
  ({ teamName, accent, addressLine, pageSize, version, hasMark: await Mark.count() > 0 })

/** The team's brand as the screens see it. */
export const readBrand = async (): Promise<Brand> => presentBrand(await findBrand())
