import { AnalysisInputError } from '../AnalysisInputError'
import type { CommonInput } from '../../types/analysis'
import { describeValue } from './describeValue'
import { inputLimits } from './inputLimits'
import { isGiven } from './isGiven'
import { readNumber } from './readNumber'

/** Name, frequency unit, gain floor (dB, at most 0) and band (in the frequency unit) of a loop. */
export function readCommonFields(record: Record<string, unknown>): CommonInput {
  const common: CommonInput = {}
  if (isGiven(record.name)) common.name = readName(record.name)
  if (isGiven(record.frequencyUnit)) {
    const unit = record.frequencyUnit
    if (unit !== 'rad/s' && unit !== 'Hz') {
      throw new AnalysisInputError(`frequencyUnit must be "rad/s" or "Hz", not ${describeValue(unit)}.`, 'frequencyUnit')
    }
    common.frequencyUnit = unit
  }
  if (isGiven(record.gainFloor)) {
    common.gainFloor = readNumber(record.gainFloor, 'gainFloor')
    if (common.gainFloor > 0) {
      throw new AnalysisInputError(`gainFloor is ${common.gainFloor} dB: above 0 dB it would hide every gain crossover. Give 0 or less.`, 'gainFloor')
    }
  }
  if (isGiven(record.band)) common.band = readBand(record.band)
  return common
}

function readName(value: unknown): string {
  if (typeof value !== 'string') throw new AnalysisInputError(`name must be text, not ${describeValue(value)}.`, 'name')
  if (value.length > inputLimits.nameLength) {
    throw new AnalysisInputError(`name has ${value.length} characters, at most ${inputLimits.nameLength} are read.`, 'name')
  }
  return value
}

function readBand(value: unknown): [number, number] {
  if (!Array.isArray(value) || value.length !== 2) {
    throw new AnalysisInputError(`band must be a list of two frequencies [from, to], not ${describeValue(value)}.`, 'band')
  }
  const from = readNumber(value[0], 'band[0]')
  const to = readNumber(value[1], 'band[1]')
  if (from < 0) throw new AnalysisInputError(`band starts at ${from}: frequencies are not negative.`, 'band[0]')
  if (to <= from) throw new AnalysisInputError(`band must rise, but it goes from ${from} to ${to}.`, 'band[1]')
  return [from, to]
}
