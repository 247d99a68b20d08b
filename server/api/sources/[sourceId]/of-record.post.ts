import { ofRecordSchema } from '#shared/schemas/source'
import { chooseOfRecord } from '../../../services/sources/chooseOfRecord'

/** POST /api/sources/[sourceId]/of-record: makes the source the one of record; the former is set aside. */
export default defineApiHandler('POST /api/sources/[sourceId]/of-record', { body: ofRecordSchema }, ({ params, body, context }) => chooseOfRecord(params.sourceId, body.setAsideReason, context))
