import { AnalysisInputError } from '../AnalysisInputError'
import { describeValue } from './describeValue'
import { inputLimits } from './inputLimits'
import { readNumber } from './readNumber'
import { readTiming, type Timing } from './readTiming'

export interface Coefficients extends Timing {
  /** Highest power first. */
  numerator: number[]
  denominator: number[]
}

/**
 * Numerator and denominator of a loop in s or z, highest power first.
 * @throws AnalysisInputError for empty lists, entries that are no finite numbers, a denominator of zeros only, a degree
 * over the limit, and a loop in s that is improper and has a dead time (its locus then winds without end).
 */
export function readCoefficients(record: Record<string, unknown>): Coefficients {
  const numerator = readPolynomial(record.numerator, 'numerator')
  const denominator = readPolynomial(record.denominator, 'denominator')
  const denominatorDegree = degreeOf(denominator)
  if (denominatorDegree < 0) throw new AnalysisInputError('denominator is zero: every coefficient in it is 0.', 'denominator')
  const timing = readTiming(record)
  const numeratorDegree = degreeOf(numerator)
  if (timing.sampleTime === undefined && (timing.deadTime ?? 0) > 0 && numeratorDegree > denominatorDegree) {
    throw new AnalysisInputError(
      `The loop is improper: its numerator is of degree ${numeratorDegree}, its denominator of degree ${denominatorDegree}. `
      + 'With dead time such a loop has no stable closed loop; add the lag it really has.', 'numerator')
  }
  return { numerator, denominator, ...timing }
}

function readPolynomial(value: unknown, path: string): number[] {
  if (!Array.isArray(value)) throw new AnalysisInputError(`${path} must be a list of coefficients, highest power first, not ${describeValue(value)}.`, path)
  if (value.length === 0) throw new AnalysisInputError(`${path} is empty: give its coefficients, highest power first.`, path)
  if (value.length > inputLimits.order + 1) {
    throw new AnalysisInputError(`${path} has ${value.length} coefficients; at most ${inputLimits.order + 1} (degree ${inputLimits.order}) are analysed.`, path)
  }
  return value.map((entry, index) => readNumber(entry, `${path}[${index}]`))
}

/** Degree without leading zeros, -1 for the zero polynomial. */
function degreeOf(coefficients: number[]): number {
  const lead = coefficients.findIndex(entry => entry !== 0)
  return lead < 0 ? -1 : coefficients.length - 1 - lead
}
