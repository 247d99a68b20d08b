import type { z } from 'zod'
import { AppError } from '#shared/errors/AppError'

/** 'members[2].email' for ['members', 2, 'email']. */
const pathOf = (path: readonly PropertyKey[]) => path.reduce<string>((text, key) =>
  typeof key === 'number' ? `${text}[${key}]` : text === '' ? String(key) : `${text}.${String(key)}`, '')

/** Input read by a schema; throws 'invalid input' with the path of the first fault, and all faults as details. */
export function parseInput<Schema extends z.ZodType>(schema: Schema, value: unknown): z.output<Schema> {
  const result = schema.safeParse(value)
  if (result.success) return result.data
  const faults = result.error.issues.map(issue => ({ path: pathOf(issue.path), message: issue.message }))
  const first = faults[0]
  throw new AppError('invalidInput', first?.message ?? 'The request is not as it should be.', { ...(first?.path && { path: first.path }), details: { faults } })
}
