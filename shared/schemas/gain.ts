import { z } from 'zod'
import { finiteNumber } from './fields'
import { limits } from './limits'

/** Fields that the gains of sources and of blocks share. */
export const coefficientsField = z.array(finiteNumber).max(limits.order + 1, `At most order ${limits.order}.`)
export const complexNumbersField = z.array(z.tuple([finiteNumber, finiteNumber])).max(limits.order, `At most order ${limits.order}.`)
export const deadTimeField = z.number('Must be a number.').nonnegative('Must not be under 0.').optional()
export const sampleTimeField = z.number('Must be a number.').positive('Must be over 0.')
export const expressionField = z.string().max(limits.expression, `At most ${limits.expression} characters.`)
export const averagesField = z.int('Must be a whole number.').positive('Must be over 0.').optional()

/** Poles counted beyond or on the stability boundary. */
export const poleCountField = z.int('Must be a whole number.').nonnegative('Must not be under 0.').max(limits.order).optional()

const column = z.int('Must be a whole number.').nonnegative('Columns are counted from 0.').max(1000)

/** How the columns of an uploaded response are read. */
export const mappingSchema = z.strictObject({
  frequencyColumn: column,
  frequencyUnit: z.enum(['Hz', 'rad/s']),
  form: z.enum(['dB and degrees', 'ratio and degrees', 'dB and radians', 'ratio and radians', 'real and imaginary']),
  firstColumn: column,
  secondColumn: column,
  coherenceColumn: column.nullable(),
  quantity: z.enum(['loopGain', 'returnDifference', 'sensitivity', 'complementarySensitivity']),
})
