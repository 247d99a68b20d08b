import { z } from 'zod'
import { limits } from './limits'

/** Half of a surrogate pair is no character, and a control character none that can be printed: an SVG drawing must not hold it. */
const unprintable = 'Must not hold control characters or broken characters: type it again rather than paste it.'

/** A text of one line. */
export const lineText = z.string().trim().regex(/^[^\p{Cc}\p{Cs}]*$/u, unprintable)

/** A text that may run over several lines. */
export const linesText = z.string().regex(/^(?:[^\p{Cc}\p{Cs}]|[\t\n\r])*$/u, unprintable)

/** A name that must not be blank. */
export const nameField = lineText.min(1, 'Must not be empty.').max(limits.name, `At most ${limits.name} characters.`)

/** A short line that may be blank. */
export const lineField = lineText.max(limits.name, `At most ${limits.name} characters.`)

/** Longer text that may be blank. */
export const notesField = linesText.max(limits.notes, `At most ${limits.notes} characters.`)

/** The short code of a loop or condition: it stands in tables and in file names. */
export const codeField = z.string().trim().min(1, 'Must not be empty.').max(limits.code, `At most ${limits.code} characters.`)
  .regex(/^[A-Za-z0-9][A-Za-z0-9._-]*$/, 'Letters, digits, point, hyphen and underscore only, beginning with a letter or digit.')

/** The id of a row. */
export const idField = z.int('Must be a whole number.').positive('Must be a whole number over 0.')

/** The version a change was made from. */
export const versionField = z.int('Must be the whole number the row was read with.').positive('Must be the whole number the row was read with.')

export const finiteNumber = z.number('Must be a number.')
