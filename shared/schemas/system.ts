import { z } from 'zod'
import { lineField, nameField, notesField, versionField } from './fields'

const fields = {
  name: nameField,
  customer: lineField,
  documentNumber: lineField,
  frequencyUnit: z.enum(['rad/s', 'Hz'], 'Must be rad/s or Hz.'),
  description: notesField,
}

export const newSystemSchema = z.strictObject({ ...fields, customer: lineField.default(''), documentNumber: lineField.default(''), description: notesField.default('') })
export const systemChangeSchema = z.strictObject(fields).partial().extend({ version: versionField })
export const systemCopySchema = z.strictObject({ name: nameField })

export type NewSystem = z.output<typeof newSystemSchema>
export type SystemChange = z.output<typeof systemChangeSchema>
