import type { z } from 'zod'

/** Where an input is at fault, and in words what is wrong there. */
export interface InputFault {
  path: string
  message: string
}

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

/** What a schema makes of an input, or every fault it finds in it. */
export function readBySchema<Schema extends z.ZodType>(schema: Schema, value: unknown): { data: z.output<Schema>, faults: null } | { data: null, faults: InputFault[] } {
  const result = schema.safeParse(value, { error: wordsOf })
  if (result.success) return { data: result.data, faults: null }
  return { data: null, faults: result.error.issues.map(issue => ({ path: pathOf(issue.path), message: issue.message })) }
}
