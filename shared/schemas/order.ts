import { z } from 'zod'
import { idField } from './fields'
import { limits } from './limits'

/** The order of the loops, or conditions, of a system: every id of the list, once. */
export const orderSchema = z.strictObject({
  ids: z.array(idField).max(limits.rows).refine(ids => new Set(ids).size === ids.length, 'Each id must stand once.'),
})
