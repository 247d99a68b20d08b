import { z } from 'zod'
import { linesText } from './fields'

/** Freezing a report: why this revision is made, as printed in the revision history. */
export const newRevisionSchema = z.strictObject({
  changeNote: linesText.trim().min(1, 'Say what changed, or \u2018First issue\u2019.').max(500, 'At most 500 characters.'),
})

/** Issuing takes no fields: what is issued was frozen before. */
export const issueSchema = z.strictObject({})

export const artefactKindSchema = z.enum(['html', 'pdf', 'zip'])

export const artefactQuerySchema = z.strictObject({
  edition: z.enum(['draft', 'issued'], 'Must be draft or issued.').optional(),
  disposition: z.enum(['inline', 'attachment'], 'Must be inline or attachment.').default('attachment'),
})

export type NewRevision = z.output<typeof newRevisionSchema>
