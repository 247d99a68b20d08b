import type { Brand } from '#shared/types/brand'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { Mark } from '../../database/models/Mark'
import { sha256Of } from '../../reports/sha256Of'
import type { ServiceContext } from '../context'
import { findBrand } from './findBrand'
import { makeMarkSafe } from './makeMarkSafe'
import { presentBrand } from './readBrand'

/** Stores a mark, made safe, in place of the one there is. Throws 'invalid input' for what is no PNG, JPEG or SVG of a sensible size. */
export async function storeMark(bytes: Buffer, context: ServiceContext): Promise<Brand> {
  const safe = await makeMarkSafe(bytes)
  const sha256 = sha256Of(safe.bytes)
  return writeTransaction(async () => {
    await Mark.destroy({ where: { id: 1 } })
    await Mark.create({ id: 1, ...safe, sha256 })
    return countChange({ mark: sha256 }, context)
  })
}

/** Takes the mark away; reports then carry the team's name alone. */
export function removeMark(context: ServiceContext): Promise<Brand> {
  return writeTransaction(async () => {
    await Mark.destroy({ where: { id: 1 } })
    return countChange({ mark: null }, context)
  })
}

async function countChange(payload: Record<string, unknown>, context: ServiceContext): Promise<Brand> {
  const row = await findBrand()
  await row.update({ version: row.version + 1 })
  await recordAudit(context, 'brand changed', { payload })
  return presentBrand(row)
}
