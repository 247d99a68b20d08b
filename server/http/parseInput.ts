import type { z } from 'zod'
import { AppError } from '#shared/errors/AppError'
import { readBySchema } from '#shared/schemas/readBySchema'

/** Input read by a schema; throws 'invalid input' with the path of the first fault, and all faults as details. */
export function parseInput<Schema extends z.ZodType>(schema: Schema, value: unknown): z.output<Schema> {
  const { data, faults } = readBySchema(schema, value)
  if (faults === null) return data
  const first = faults[0]
  throw new AppError('invalidInput', first?.message ?? 'The request is not as it should be.', { ...(first?.path && { path: first.path }), details: { faults } })
}
