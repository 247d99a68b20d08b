import { z } from 'zod'

const limitField = z.number('Must be a number.').positive('Must be over 0: leave it empty for no limit.').nullable()

const criterionSchema = z.discriminatedUnion('quantity', [
  z.strictObject({ quantity: z.literal('gainMargin'), limit: limitField }),
  z.strictObject({ quantity: z.literal('phaseMargin'), limit: limitField.refine(limit => limit === null || limit <= 180, 'At most 180 degrees.') }),
  z.strictObject({ quantity: z.literal('vectorMargin'), limit: limitField }),
  z.strictObject({ quantity: z.literal('delayMargin'), limit: limitField }),
])

/** The criteria of a system, replaced as a whole; a quantity left out has no limit. */
export const criteriaSchema = z.strictObject({
  criteria: z.array(criterionSchema).max(4)
    .refine(criteria => new Set(criteria.map(criterion => criterion.quantity)).size === criteria.length, 'Each quantity must stand once.'),
})
