import { z } from 'zod'
import { limits } from './limits'

/** A name that must not be blank. */
export const nameField = z.string().trim().min(1, 'Must not be empty.').max(limits.name, `At most ${limits.name} characters.`)

/** A short line that may be blank. */
export const lineField = z.string().trim().max(limits.name, `At most ${limits.name} characters.`)

/** Longer text that may be blank. */
export const notesField = z.string().max(limits.notes, `At most ${limits.notes} characters.`)

/** The short code of a loop or condition: it stands in tables and in file names. */
export const codeField = z.string().trim().min(1, 'Must not be empty.').max(limits.code, `At most ${limits.code} characters.`)
  .regex(/^[A-Za-z0-9][A-Za-z0-9._-]*$/, 'Letters, digits, point, hyphen and underscore only, beginning with a letter or digit.')

/** The id of a row. */
export const idField = z.int('Must be a whole number.').positive('Must be a whole number over 0.')

/** The version a change was made from. */
export const versionField = z.int('Must be the whole number the row was read with.').positive('Must be the whole number the row was read with.')

export const finiteNumber = z.number('Must be a number.')
