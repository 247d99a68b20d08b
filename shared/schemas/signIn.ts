import { z } from 'zod'
import { limits } from './limits'
import { emailField, personName } from './person'

/** A new password: long rather than curious; anything may be pasted. */
export const newPasswordField = z.string()
  .min(limits.passwordLeast, `At least ${limits.passwordLeast} characters.`)
  .max(limits.passwordMost, `At most ${limits.passwordMost} characters.`)
  .refine(password => new Set(password).size >= 5, 'Use at least five different characters.')

/** What is typed at the door is only bounded: whether it fits is told by one answer for all. */
export const signInSchema = z.strictObject({ email: z.string().trim().toLowerCase().max(limits.email), password: z.string().max(1000) })
export const firstAdministratorSchema = z.strictObject({ name: personName, email: emailField, password: newPasswordField })
export const resetRequestSchema = z.strictObject({ email: z.string().trim().toLowerCase().max(limits.email) })
export const passwordSchema = z.strictObject({ token: z.string().max(200), password: newPasswordField })
