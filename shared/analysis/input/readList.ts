import { AnalysisInputError } from '../AnalysisInputError'
import { describeValue } from './describeValue'

/** A list of between `least` and `most` entries. @throws AnalysisInputError naming the field, with what it should hold */
export function readList(value: unknown, path: string, what: string, least: number, most: number): unknown[] {
  if (!Array.isArray(value)) throw new AnalysisInputError(`${path} must be a list of ${what}, not ${describeValue(value)}.`, path)
  if (value.length < least || value.length > most) {
    const wanted = least === most ? `${least} are needed` : value.length < least ? `at least ${least} must be there` : `at most ${most} are read`
    throw new AnalysisInputError(`${path} has ${value.length} entries; ${wanted}: ${what}.`, path)
  }
  return value
}
