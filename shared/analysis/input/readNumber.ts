import { AnalysisInputError } from '../AnalysisInputError'
import { describeValue } from './describeValue'

/**
 * A finite number, or an error that names the field.
 * @throws AnalysisInputError with `path` for anything else: text, null, NaN, infinities.
 */
export function readNumber(value: unknown, path: string): number {
  if (typeof value !== 'number' || !Number.isFinite(value)) {
    throw new AnalysisInputError(`${path} must be a finite number, not ${describeValue(value)}.`, path)
  }
  return value
}
