import type { BrandChange } from '#shared/schemas/brand'
import type { Brand } from '#shared/types/brand'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { assertNewest } from '../assertNewest'
import type { ServiceContext } from '../context'
import { findBrand } from './findBrand'
import { presentBrand } from './readBrand'

/** Replaces the fields of the brand. Throws 'conflict' from an older version. What was frozen keeps the brand it had. */
export function changeBrand({ version, ...fields }: BrandChange, context: ServiceContext): Promise<Brand> {
  return writeTransaction(async () => {
    const row = await findBrand()
    assertNewest(row, version, await presentBrand(row))
    await row.update({ ...fields, version: version + 1 })
    await recordAudit(context, 'brand changed', { payload: { ...fields } })
    return presentBrand(row)
  })
}
