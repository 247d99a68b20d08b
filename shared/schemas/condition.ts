import { z } from 'zod'
import { codeField, finiteNumber, lineText, nameField, notesField, versionField } from './fields'
import { limits } from './limits'

const coordinate = z.strictObject({ name: nameField, unit: lineText.max(limits.unit), value: finiteNumber })
const coordinatesField = z.array(coordinate).max(limits.coordinates, `At most ${limits.coordinates} coordinates.`)
const tagsField = z.array(lineText.min(1, 'Must not be empty.').max(limits.tag, `At most ${limits.tag} characters.`)).max(limits.tags, `At most ${limits.tags} tags.`)

const fields = {
  code: codeField,
  name: nameField,
  coordinates: coordinatesField,
  tags: tagsField,
  notes: notesField,
}

export const newConditionSchema = z.strictObject({ ...fields, coordinates: coordinatesField.default([]), tags: tagsField.default([]), notes: notesField.default('') })
export const conditionChangeSchema = z.strictObject(fields).partial().extend({ version: versionField })
export const conditionCopySchema = z.strictObject({ code: codeField, name: nameField })

export type NewCondition = z.output<typeof newConditionSchema>
export type ConditionChange = z.output<typeof conditionChangeSchema>
export type ConditionCopy = z.output<typeof conditionCopySchema>
