import { z } from 'zod'
import { finiteNumber, idField, lineField, nameField, versionField } from './fields'
import { averagesField, coefficientsField, complexNumbersField, deadTimeField, expressionField, mappingSchema, poleCountField, sampleTimeField } from './gain'
import { limits } from './limits'

const deadTime = deadTimeField
const sampleTime = sampleTimeField.optional()
const poleCount = poleCountField

/** How a loop's gain is given. Whether it can be analysed is the engine's to say. */
export const sourceDefinitionSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('coefficients'), numerator: coefficientsField, denominator: coefficientsField, deadTime, sampleTime }),
  z.strictObject({ kind: z.literal('zerosPoles'), zeros: complexNumbersField, poles: complexNumbersField, gain: finiteNumber, deadTime, sampleTime }),
  z.strictObject({ kind: z.literal('expression'), expression: expressionField, deadTime, sampleTime }),
  z.strictObject({
    kind: z.literal('measured'),
    uploadId: idField,
    mapping: mappingSchema,
    averages: averagesField,
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
