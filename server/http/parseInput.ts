import type { z } from 'zod'
import { AppError } from '#shared/errors/AppError'

/** 'members[2].email' for ['members', 2, 'email']. */
const pathOf = (path: readonly PropertyKey[]) => path.reduce<string>((text, key) =>
  typeof key === 'number' ? `${text}[${key}]` : text === '' ? String(key) : `${text}.${String(key)}`, '')

const nouns: Record<string, string> = { string: 'text', number: 'a number', int: 'a whole number', boolean: 'true or false', array: 'a list', object: 'an object', record: 'an object', tuple: 'a list' }

/** Plain words for the faults that a schema has none of its own for. */
const wordsOf: z.core.$ZodErrorMap = (issue) => {
  if (issue.code === 'unrecognized_keys') return `There is no field ${issue.keys.map(key => `'${key}'`).join(', ')} here.`
  if (issue.code !== 'invalid_type') return undefined
  return issue.input === undefined ? 'Is missing.' : `Must be ${nouns[issue.expected] ?? issue.expected}.`
}

/** Input read by a schema; throws 'invalid input' with the path of the first fault, and all faults as details. */
export function parseInput<Schema extends z.ZodType>(schema: Schema, value: unknown): z.output<Schema> {
  const result = schema.safeParse(value, { error: wordsOf })
  if (result.success) return result.data
  const faults = result.error.issues.map(issue => ({ path: pathOf(issue.path), message: issue.message }))
  const first = faults[0]
  throw new AppError('invalidInput', first?.message ?? 'The request is not as it should be.', { ...(first?.path && { path: first.path }), details: { faults } })
}
