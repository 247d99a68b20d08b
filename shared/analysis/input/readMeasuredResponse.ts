import { AnalysisInputError } from '../AnalysisInputError'
import type { MeasuredInput, MeasuredPoint, MeasuredQuantity } from '../../types/analysis'
import { describeValue } from './describeValue'
import { inputLimits } from './inputLimits'
import { isGiven } from './isGiven'
import { readNumber } from './readNumber'
import { readRecord } from './readRecord'
import { readWholeNumber } from './readWholeNumber'

const quantities: readonly MeasuredQuantity[] = ['loopGain', 'returnDifference', 'sensitivity', 'complementarySensitivity']

/**
 * A measured response: at least two points in rising order of frequency, frequencies not negative, coherence 0 to 1.
 * @throws AnalysisInputError naming the field ('measured.points[3].coherence') for anything else.
 */
export function readMeasuredResponse(record: Record<string, unknown>): Omit<MeasuredInput, 'name' | 'frequencyUnit' | 'gainFloor' | 'band'> {
  const measured = readRecord(record.measured, 'measured', 'measured')
  const quantity = quantities.find(known => known === measured.quantity)
  if (quantity === undefined) {
    throw new AnalysisInputError(`measured.quantity must be one of ${quantities.join(', ')}, not ${describeValue(measured.quantity)}.`, 'measured.quantity')
  }
  const response: MeasuredInput['measured'] = { quantity, points: readMeasuredPoints(measured.points, 'measured.points') }
  if (isGiven(measured.averages)) response.averages = readWholeNumber(measured.averages, 'measured.averages', 1, 1e9)
  if (isGiven(measured.stayedStable)) {
    if (typeof measured.stayedStable !== 'boolean') {
      throw new AnalysisInputError(`measured.stayedStable must be true or false, not ${describeValue(measured.stayedStable)}.`, 'measured.stayedStable')
    }
    response.stayedStable = measured.stayedStable
  }
  const poles = (field: 'openLoopUnstablePoles' | 'openLoopOriginPoles') =>
    isGiven(record[field]) && { [field]: readWholeNumber(record[field], field, 0, inputLimits.order) }
  return { measured: response, ...poles('openLoopUnstablePoles'), ...poles('openLoopOriginPoles') }
}

/** The points of a response: at least two in rising order of frequency. @throws AnalysisInputError naming the field below `path` */
export function readMeasuredPoints(value: unknown, path: string): MeasuredPoint[] {
  if (!Array.isArray(value)) throw new AnalysisInputError(`${path} must be a list of points, not ${describeValue(value)}.`, path)
  if (value.length < 2) {
    throw new AnalysisInputError(`${path} holds ${value.length === 1 ? 'a single point' : 'no point'}: a response needs at least two, for nothing can be said between.`, path)
  }
  if (value.length > inputLimits.measuredPoints) {
    throw new AnalysisInputError(`${path} holds ${value.length} points; at most ${inputLimits.measuredPoints} are analysed.`, path)
  }
  let before = -1
  return value.map((entry, index) => {
    const point = readPoint(entry, `${path}[${index}]`)
    if (point.frequency <= before) {
      const how = point.frequency === before ? 'repeats the frequency of' : 'is below'
      throw new AnalysisInputError(
        `${path}[${index}].frequency (${point.frequency}) ${how} the point before (${before}): give the points once each, in rising order.`, `${path}[${index}].frequency`)
    }
    before = point.frequency
    return point
  })
}

function readPoint(value: unknown, path: string): MeasuredPoint {
  const record = readRecord(value, path, path)
  const point: MeasuredPoint = {
    frequency: readNumber(record.frequency, `${path}.frequency`),
    re: readNumber(record.re, `${path}.re`),
    im: readNumber(record.im, `${path}.im`),
  }
  if (point.frequency < 0) throw new AnalysisInputError(`${path}.frequency is ${point.frequency}: frequencies are not negative.`, `${path}.frequency`)
  if (isGiven(record.coherence)) {
    point.coherence = readNumber(record.coherence, `${path}.coherence`)
    if (point.coherence < 0 || point.coherence > 1) {
      throw new AnalysisInputError(`${path}.coherence is ${point.coherence}: coherence lies between 0 and 1.`, `${path}.coherence`)
    }
  }
  return point
}
