import { AnalysisInputError } from '../AnalysisInputError'
import { isGiven } from './isGiven'
import { readNumber } from './readNumber'

export interface Timing {
  /** s, at least 0 */
  deadTime?: number
  /** s, above 0; given for a loop in z */
  sampleTime?: number
}

/** Dead time and sample time in seconds; @throws AnalysisInputError for a negative dead time or a sample time not above 0. */
export function readTiming(record: Record<string, unknown>): Timing {
  const timing: Timing = {}
  if (isGiven(record.deadTime)) {
    timing.deadTime = readNumber(record.deadTime, 'deadTime')
    if (timing.deadTime < 0) {
      throw new AnalysisInputError(`deadTime is ${timing.deadTime} s: a loop cannot answer before it is asked. Give 0 or more.`, 'deadTime')
    }
  }
  if (isGiven(record.sampleTime)) {
    timing.sampleTime = readNumber(record.sampleTime, 'sampleTime')
    if (timing.sampleTime <= 0) {
      throw new AnalysisInputError(`sampleTime is ${timing.sampleTime} s: it must be above 0. Leave it out for a loop in s.`, 'sampleTime')
    }
  }
  return timing
}
