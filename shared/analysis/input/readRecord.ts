import { AnalysisInputError } from '../AnalysisInputError'
import { describeValue } from './describeValue'

/** The value as an object with named fields; @throws AnalysisInputError for lists, text, numbers and nothing. */
export function readRecord(value: unknown, path: string, what: string): Record<string, unknown> {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    throw new AnalysisInputError(`${what} must be an object with named fields, not ${describeValue(value)}.`, path)
  }
  return value as Record<string, unknown>
}
