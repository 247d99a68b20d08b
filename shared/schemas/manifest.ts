import { z } from 'zod'
import { manifestFormat, manifestVersion } from '../types/manifest'
import { roleField, unitField } from './block'
import { newConditionSchema } from './condition'
import { criteriaSchema } from './criterion'
import { codeField, finiteNumber, lineField, nameField, notesField } from './fields'
import { limits } from './limits'
import { newLoopSchema } from './loop'
import { parameterNameField } from './parameter'
import { newSystemSchema } from './system'

/** The field says which form of definition it is; the forms themselves are read by the schemas of the routes. */
const definitionField = z.looseObject({ kind: z.string('Must be the kind of the definition.') })

const byCode = <Value extends z.ZodType>(value: Value) => z.record(codeField, value)

const uploadNameFields = {
  fileName: nameField,
  sha256: z.string().regex(/^[0-9a-f]{64}$/, 'Must be the SHA-256 of the file in 64 small hexadecimal digits.'),
}

const parameterSchema = z.strictObject({
  name: parameterNameField,
  unit: unitField.default(''),
  notes: notesField.default(''),
  values: byCode(finiteNumber),
})

const blockSchema = z.strictObject({
  name: parameterNameField,
  role: roleField,
  unitIn: unitField.default(''),
  unitOut: unitField.default(''),
  notes: notesField.default(''),
  definition: definitionField.nullable(),
  byCondition: byCode(definitionField).default({}),
})

const loopStateSchema = z.discriminatedUnion('state', [
  z.strictObject({ loop: codeField, state: z.enum(['closed', 'open']) }),
  z.strictObject({ loop: codeField, state: z.literal('held'), gain: finiteNumber }),
], 'Must be closed, open or held at a gain.')

const sourceSchema = z.strictObject({
  name: nameField,
  conditions: z.array(codeField).min(1, 'Name at least one operating condition.').max(limits.rows),
  ofRecord: z.boolean(),
  setAsideReason: lineField.default(''),
  definition: definitionField,
})

const loopSchema = newLoopSchema.omit({ loopStates: true }).extend({
  loopStates: z.array(loopStateSchema).max(limits.rows, `At most ${limits.rows} loops.`).default([]),
  // How many a manifest may hold together is counted by findManifestFaults: a loop may have several in each of its conditions.
  sources: z.array(sourceSchema).default([]),
})

const uploadSchema = z.union([
  z.strictObject({ ...uploadNameFields, text: z.string() }),
  z.strictObject({ ...uploadNameFields, base64: z.string() }),
], 'Must be fileName, sha256, and either text or base64.')

/** The shape of a manifest, short of what its definitions hold and of what its parts say of one another: see readManifest. */
export const manifestSchema = z.strictObject({
  format: z.literal(manifestFormat),
  version: z.literal(manifestVersion),
  system: newSystemSchema,
  conditions: z.array(newConditionSchema).max(limits.rows, `At most ${limits.rows} operating conditions.`).default([]),
  parameters: z.array(parameterSchema).max(limits.parameters, `At most ${limits.parameters} parameters.`).default([]),
  blocks: z.array(blockSchema).max(limits.blocks, `At most ${limits.blocks} blocks.`).default([]),
  loops: z.array(loopSchema).max(limits.rows, `At most ${limits.rows} loops.`).default([]),
  criteria: criteriaSchema.shape.criteria.default([]),
  uploads: z.array(uploadSchema).max(10 * limits.rows).default([]),
})
