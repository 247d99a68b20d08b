import type { ReportSnapshot } from '#shared/types/snapshot'
import { Mark } from '../../database/models/Mark'
import { findBrand } from './findBrand'

/** The brand with its mark inside, as a report carries it. */
export async function readBrandForPrint(): Promise<ReportSnapshot['brand']> {
  const [{ teamName, accent, addressLine, pageSize }, mark] = await Promise.all([findBrand(), Mark.findByPk(1)])
  return { teamName, accent, addressLine, pageSize, mark: mark === null ? null : `data:${mark.mediaType};base64,${mark.bytes.toString('base64')}` }
}
