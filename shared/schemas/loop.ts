import { z } from 'zod'
import { codeField, lineField, nameField, notesField, versionField } from './fields'

const fields = {
  code: codeField,
  name: nameField,
  axis: lineField,
  breakPoint: notesField,
  otherLoops: notesField,
  notes: notesField,
}

export const newLoopSchema = z.strictObject({
  ...fields,
  axis: lineField.default(''),
  breakPoint: notesField.default(''),
  otherLoops: notesField.default(''),
  notes: notesField.default(''),
})
export const loopChangeSchema = z.strictObject(fields).partial().extend({ version: versionField })
export const loopCopySchema = z.strictObject({ code: codeField, name: nameField })

export type NewLoop = z.output<typeof newLoopSchema>
export type LoopChange = z.output<typeof loopChangeSchema>
export type LoopCopy = z.output<typeof loopCopySchema>
