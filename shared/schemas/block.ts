import { z } from 'zod'
import { finiteNumber, idField, lineText, notesField, versionField } from './fields'
import { averagesField, coefficientsField, complexNumbersField, deadTimeField, expressionField, mappingSchema, poleCountField, sampleTimeField } from './gain'
import { limits } from './limits'
import { parameterNameField } from './parameter'

const sampleTime = sampleTimeField.optional()

/** Names of channels as in G[rate, torque]; [] where they are only counted. */
const channelNamesField = z.array(parameterNameField).max(limits.channels, `At most ${limits.channels} channels.`)
  .refine(names => new Set(names).size === names.length, 'Each channel must have a name of its own.')

const channelGains = z.array(finiteNumber).min(1, 'One for each channel.').max(limits.channels, `At most ${limits.channels} channels.`)

const modeSchema = z.strictObject({
  name: lineText.max(limits.unit, `At most ${limits.unit} characters.`),
  frequency: z.number('Must be a number.').positive('Must be over 0.'),
  damping: finiteNumber,
  gainIn: channelGains,
  gainOut: channelGains,
})

const rigidSchema = z.strictObject({ power: z.union([z.literal(0), z.literal(-1), z.literal(-2)], 'Must be 0, -1 or -2.'), gainIn: channelGains, gainOut: channelGains })

/** A cell as typed: whether it is a number is told when it is read, with its place. */
const typedNumber = z.string('Must be the text of a number.').max(limits.unit, `At most ${limits.unit} characters.`)

/** How the gain of a block is given. Whether it can be analysed is the engine's to say. */
export const blockDefinitionSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('expression'), expression: expressionField, sampleTime }),
  z.strictObject({ kind: z.literal('coefficients'), numerator: coefficientsField, denominator: coefficientsField, deadTime: deadTimeField, sampleTime }),
  z.strictObject({ kind: z.literal('zerosPoles'), zeros: complexNumbersField, poles: complexNumbersField, gain: finiteNumber, deadTime: deadTimeField, sampleTime }),
  z.strictObject({
    kind: z.literal('stateSpace'),
    uploadId: idField,
    set: lineText.max(limits.name, `At most ${limits.name} characters.`).nullable(),
    states: z.int('Must be a whole number.').positive('Must be over 0.').max(limits.states, `At most ${limits.states} states.`).nullable(),
    inputs: channelNamesField,
    outputs: channelNamesField,
    sampleTime,
  }),
  z.strictObject({
    kind: z.literal('sections'),
    rows: z.array(z.array(typedNumber).length(6, 'A section has six coefficients: b0 b1 b2 a0 a1 a2.')).min(1, 'At least one section.').max(limits.sections, `At most ${limits.sections} sections.`),
    gain: typedNumber,
    sampleTime: sampleTimeField,
  }),
  z.strictObject({
    kind: z.literal('modal'),
    frequencyUnit: z.enum(['rad/s', 'Hz'], 'Must be rad/s or Hz.'),
    derivative: z.union([z.literal(0), z.literal(1), z.literal(2)], 'Must be 0, 1 or 2.'),
    modes: z.array(modeSchema).max(limits.modes, `At most ${limits.modes} modes.`),
    rigid: z.array(rigidSchema).max(limits.modes, `At most ${limits.modes} terms.`),
    inputs: channelNamesField,
    outputs: channelNamesField,
  }),
  z.strictObject({
    kind: z.literal('measured'),
    uploadId: idField,
    mapping: mappingSchema.refine(mapping => mapping.quantity === 'loopGain', { path: ['quantity'], message: 'A block is measured from its input to its output: take its response itself.' }),
    averages: averagesField,
    openLoopUnstablePoles: poleCountField,
    openLoopOriginPoles: poleCountField,
  }),
  z.strictObject({ kind: z.literal('deadTime'), deadTime: z.number('Must be a number.').nonnegative('Must not be under 0.'), unit: z.enum(['s', 'samples'], 'Must be s or samples.') }),
  z.strictObject({
    kind: z.literal('hold'),
    hold: z.enum(['zeroOrder', 'pwmSingleUpdate', 'pwmDoubleUpdate'], 'Must be zeroOrder, pwmSingleUpdate or pwmDoubleUpdate.'),
    sampleTime: sampleTimeField,
    duty: z.number('Must be a number.').min(0, 'Must not be under 0.').max(1, 'Must not be over 1.').optional(),
  }),
])

/** Unit of a signal or parameter, as it is printed. */
export const unitField = lineText.max(limits.unit, `At most ${limits.unit} characters.`)
const byConditionField = z.record(z.string().regex(/^[1-9]\d{0,15}$/, 'Must be the id of a condition.'), blockDefinitionSchema)

export const roleField = z.enum(['controller', 'filter', 'actuator', 'plant', 'sensor', 'delay', 'hold', 'other'], 'Must be controller, filter, actuator, plant, sensor, delay, hold or other.')

const fields = {
  name: parameterNameField,
  role: roleField,
  unitIn: unitField,
  unitOut: unitField,
  notes: notesField,
  definition: blockDefinitionSchema.nullable(),
  byCondition: byConditionField,
}

export const newBlockSchema = z.strictObject({
  ...fields, unitIn: unitField.default(''), unitOut: unitField.default(''), notes: notesField.default(''), byCondition: byConditionField.default({}),
})
export const blockChangeSchema = z.strictObject(fields).partial().extend({ version: versionField })
/** A block as it is drafted, new or changed. */
export const blockEffectsSchema = z.strictObject({
  blockId: idField.nullable(), name: fields.name, role: fields.role, definition: fields.definition, byCondition: fields.byCondition,
})
/** Which file of matrices is looked at, and what only its reader can know of it. */
export const matricesSchema = z.strictObject({
  uploadId: idField,
  states: z.int('Must be a whole number.').positive('Must be over 0.').max(limits.states, `At most ${limits.states} states.`).nullable(),
  outputs: z.int('Must be a whole number.').positive('Must be over 0.').max(limits.channels, `At most ${limits.channels} channels.`).nullable().default(null),
})

export type NewBlock = z.output<typeof newBlockSchema>
export type BlockChange = z.output<typeof blockChangeSchema>
export type BlockDraft = z.output<typeof blockEffectsSchema>
export type MatricesQuestion = z.output<typeof matricesSchema>
