import { AnalysisInputError } from '../AnalysisInputError'
import { complexRefusal } from './complexRefusal'
import { describeValue } from './describeValue'

/**
 * A finite number, or an error that names the field.
 * @throws AnalysisInputError with `path` for anything else: text, null, NaN, infinities.
 */
export function readNumber(value: unknown, path: string): number {
  if (isComplex(value)) throw new AnalysisInputError(`${path} is a complex number. ${complexRefusal}`, path)
  if (typeof value !== 'number' || !Number.isFinite(value)) {
    throw new AnalysisInputError(`${path} must be a finite number, not ${describeValue(value)}.`, path)
  }
  return value
}

/** A complex number in one of the ways they are written: [1, 2], { re: 1, im: 2 }, "1 + 2j". */
function isComplex(value: unknown): boolean {
  if (Array.isArray(value)) return value.length === 2 && value.every(part => typeof part === 'number')
  if (typeof value === 'string') return value.length <= 100 && /^[\d\s.e+-]*\d[\s*]*[ij]$/i.test(value)
  return typeof value === 'object' && value !== null && 're' in value && 'im' in value
}
