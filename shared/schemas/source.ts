import { z } from 'zod'
import { finiteNumber, idField, lineField, nameField, versionField } from './fields'
import { limits } from './limits'

const numbers = z.array(finiteNumber).max(limits.order + 1, `At most order ${limits.order}.`)
const complexNumbers = z.array(z.tuple([finiteNumber, finiteNumber])).max(limits.order, `At most order ${limits.order}.`)
const deadTime = z.number('Must be a number.').nonnegative('Must not be under 0.').optional()
const sampleTime = z.number('Must be a number.').positive('Must be over 0.').optional()
const poleCount = z.int('Must be a whole number.').nonnegative('Must not be under 0.').max(limits.order).optional()
const column = z.int('Must be a whole number.').nonnegative('Columns are counted from 0.').max(1000)

const mappingSchema = z.strictObject({
  frequencyColumn: column,
  frequencyUnit: z.enum(['Hz', 'rad/s']),
  form: z.enum(['dB and degrees', 'ratio and degrees', 'dB and radians', 'ratio and radians', 'real and imaginary']),
  firstColumn: column,
  secondColumn: column,
  coherenceColumn: column.nullable(),
  quantity: z.enum(['loopGain', 'returnDifference', 'sensitivity', 'complementarySensitivity']),
})

/** How a loop's gain is given. Whether it can be analysed is the engine's to say. */
export const sourceDefinitionSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('coefficients'), numerator: numbers, denominator: numbers, deadTime, sampleTime }),
  z.strictObject({ kind: z.literal('zerosPoles'), zeros: complexNumbers, poles: complexNumbers, gain: finiteNumber, deadTime, sampleTime }),
  z.strictObject({ kind: z.literal('expression'), expression: z.string().max(limits.expression, `At most ${limits.expression} characters.`), deadTime, sampleTime }),
  z.strictObject({
    kind: z.literal('measured'),
    uploadId: idField,
    mapping: mappingSchema,
    averages: z.int('Must be a whole number.').positive('Must be over 0.').optional(),
    stayedStable: z.boolean().optional(),
    openLoopUnstablePoles: poleCount,
    openLoopOriginPoles: poleCount,
    amplitude: lineField.optional(),
  }),
])

export const newSourceSchema = z.strictObject({
  conditionIds: z.array(idField).min(1, 'Choose at least one operating condition.').max(limits.rows).refine(ids => new Set(ids).size === ids.length, 'Each condition must stand once.'),
  name: nameField,
  definition: sourceDefinitionSchema,
  ofRecord: z.boolean(),
  setAsideReason: lineField.default(''),
})

export const sourceChangeSchema = z.strictObject({
  version: versionField,
  name: nameField,
  definition: sourceDefinitionSchema,
  setAsideReason: lineField.default(''),
})

export const ofRecordSchema = z.strictObject({ setAsideReason: nameField })

export type NewSource = z.output<typeof newSourceSchema>
export type SourceChange = z.output<typeof sourceChangeSchema>
