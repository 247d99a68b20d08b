import type { CoefficientsInput, ZerosPolesInput } from '../types/analysis'
import type { FactoredLoop } from './FactoredLoop'
import { factorsFromCoefficients } from './factors/factorsFromCoefficients'
import { factorsFromRoots } from './factors/factorsFromRoots'

/** The factors of a loop given by coefficients or by zeros, poles and gain. @throws AnalysisInputError */
export function factorsOfInput(input: CoefficientsInput | ZerosPolesInput): FactoredLoop {
  const options = { deadTime: input.deadTime ?? 0, ...(input.sampleTime === undefined ? {} : { sampleTime: input.sampleTime }) }
  return 'numerator' in input
    ? factorsFromCoefficients(input.numerator, input.denominator, options)
    : factorsFromRoots(input.zeros, input.poles, input.gain, options)
}
