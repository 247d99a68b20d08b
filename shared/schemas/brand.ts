import { z } from 'zod'
import { lineField, nameField, versionField } from './fields'

/** The team's brand as printed on every report. */
export const brandSchema = z.strictObject({
  teamName: nameField,
  accent: z.string().regex(/^#[0-9a-fA-F]{6}$/, 'Must be a colour as #RRGGBB.').transform(colour => colour.toUpperCase()),
  addressLine: lineField,
  pageSize: z.enum(['A4', 'Letter'], 'Must be A4 or Letter.'),
  version: versionField,
})

export type BrandChange = z.output<typeof brandSchema>

/** What a team's mark may be. Bytes; pixels of each side. */
export const markLimits = { bytes: 1_000_000, pixels: 4096 } as const
