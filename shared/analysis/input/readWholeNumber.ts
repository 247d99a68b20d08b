import { AnalysisInputError } from '../AnalysisInputError'
import { describeValue } from './describeValue'

/** A whole number in [least, most]; @throws AnalysisInputError naming the field otherwise. */
export function readWholeNumber(value: unknown, path: string, least: number, most: number): number {
  if (typeof value !== 'number' || !Number.isInteger(value) || value < least || value > most) {
    throw new AnalysisInputError(`${path} must be a whole number from ${least} to ${most}, not ${describeValue(value)}.`, path)
  }
  return value
}
