import { z } from 'zod'
import { nameField } from './fields'
import { limits } from './limits'

/**
 * An address that a mail can be sent to without a second reading: no quotes, commas, spaces or line breaks, which a
 * header could take for a second recipient.
 */
export const emailField = z.string().trim().toLowerCase().max(limits.email, `At most ${limits.email} characters.`)
  .regex(/^[a-z0-9.!#$%&*+/=?^_{|}~-]+@[a-z0-9](?:[a-z0-9-]*[a-z0-9])?(?:\.[a-z0-9](?:[a-z0-9-]*[a-z0-9])?)*$/, 'Must be an e-mail address such as name@example.org.')

/** A person's name stands in mail headers and on paper: one line, without control characters. */
export const personName = nameField.regex(/^[^\p{Cc}<>"]+$/u, 'Must not hold quotation marks, angle brackets or line breaks.')

export const newPersonSchema = z.strictObject({ name: personName, email: emailField, isAdministrator: z.boolean().default(false) })
export const personChangeSchema = z.strictObject({ name: personName, isAdministrator: z.boolean(), disabled: z.boolean() }).partial()
  .refine(change => Object.keys(change).length > 0, 'Name, isAdministrator or disabled must be given.')

export const membersSchema = z.strictObject({
  members: z.array(z.strictObject({
    email: emailField,
    roles: z.array(z.enum(['engineer', 'checker', 'approver', 'customer'])).min(1, 'Choose at least one role.')
      .refine(roles => new Set(roles).size === roles.length, 'Each role must stand once.'),
  })).max(limits.rows).superRefine((members, problems) => {
    const seen = new Set<string>()
    members.forEach(({ email }, index) => {
      if (seen.has(email)) problems.addIssue({ code: 'custom', path: [index, 'email'], message: `${email} stands twice.` })
      seen.add(email)
    })
  }),
})

export type NewPerson = z.output<typeof newPersonSchema>
export type PersonChange = z.output<typeof personChangeSchema>
export type MemberEntry = z.output<typeof membersSchema>['members'][number]
