import { z } from 'zod'
import { idField, lineText, linesText, nameField, versionField } from './fields'
import { limits } from './limits'

/** Characters of the remarks of a report, or of one of its loops. */
const remarksLength = 20_000

const documentNumberField = lineText.min(1, 'Must not be empty.').max(60, 'At most 60 characters.')
const remarksField = linesText.max(remarksLength, `At most ${remarksLength} characters.`)

const coverageField = z.array(idField).max(limits.rows, `At most ${limits.rows}.`)
  .refine(ids => new Set(ids).size === ids.length, 'Each must stand once.')

export const newReportSchema = z.strictObject({ title: nameField, documentNumber: documentNumberField })

export const reportChangeSchema = z.strictObject({
  title: nameField,
  documentNumber: documentNumberField,
  loopIds: coverageField,
  conditionIds: coverageField,
  remarks: remarksField,
  loopRemarks: z.record(z.string().regex(/^[1-9]\d{0,14}$/, 'Must be the id of a loop.'), remarksField),
}).partial().extend({ version: versionField })

export type NewReport = z.output<typeof newReportSchema>
export type ReportChange = z.output<typeof reportChangeSchema>
