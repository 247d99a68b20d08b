import { markLimits } from '#shared/schemas/brand'
import { readBytes } from '../../http/readJsonBody'
import { storeMark } from '../../services/brand/storeMark'

/** PUT /api/brand/mark: the bytes of a PNG, JPEG or SVG, made safe and stored. */
export default defineApiHandler('PUT /api/brand/mark', {}, async ({ event, context }) => storeMark(await readBytes(event, markLimits.bytes), context))
