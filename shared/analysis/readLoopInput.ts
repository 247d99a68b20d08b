import type { LoopInput } from '../types/analysis'
import { AnalysisInputError } from './AnalysisInputError'
import { chooseSourceForm } from './input/chooseSourceForm'
import { readCoefficients } from './input/readCoefficients'
import { readCommonFields } from './input/readCommonFields'
import { readExpression } from './input/readExpression'
import { readMeasuredResponse } from './input/readMeasuredResponse'
import { readRecord } from './input/readRecord'
import { readZerosPoles } from './input/readZerosPoles'
import { sampleTimeOfInput } from './sampleTimeOfInput'

/**
 * One entry of the contract, checked: what comes back holds only fields of the contract, each of its kind and size.
 * Units and signs are those of `LoopInput`; numbers are passed on exactly as given. A field that is null counts as left out.
 *
 * @param value what a file, a form or a request holds, of any kind
 * @throws AnalysisInputError whose `path` names the field at fault, in time and memory bounded by `inputLimits`
 */
export function readLoopInput(value: unknown): LoopInput {
  const record = readRecord(value, '', 'A loop')
  const form = chooseSourceForm(record)
  const common = readCommonFields(record)
  const input = { ...common, ...readSource(record, form.key[0]) }
  refuseBandBeyondHalfSampling(input)
  return input
}

function readSource(record: Record<string, unknown>, key: 'numerator' | 'zeros' | 'expression' | 'measured') {
  switch (key) {
    case 'numerator': return readCoefficients(record)
    case 'zeros': return readZerosPoles(record)
    case 'expression': return readExpression(record)
    case 'measured': return readMeasuredResponse(record)
  }
}

/** A sampled loop's axis ends at pi/T: a band that starts there or above holds nothing. */
function refuseBandBeyondHalfSampling(input: LoopInput): void {
  if (input.band === undefined) return
  const sampleTime = sampleTimeOfInput(input)
  if (sampleTime === undefined) return
  const axisEnd = (input.frequencyUnit === 'Hz' ? 0.5 : Math.PI) / sampleTime
  if (input.band[0] >= axisEnd) {
    throw new AnalysisInputError(`band starts at ${input.band[0]}, but the axis of this sampled loop ends at half its sampling frequency, ${axisEnd}.`, 'band[0]')
  }
}
