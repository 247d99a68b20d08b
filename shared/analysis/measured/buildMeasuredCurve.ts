import type { MeasuredInput } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import { confidenceRadius } from './confidenceRadius'
import { loopGainOf } from './loopGainOf'
import type { MeasuredCurve } from './MeasuredCurve'
import { monotoneSlopes } from './monotoneSlopes'
import { radiusOfLoopGain } from './radiusOfLoopGain'

/**
 * The curve of a measured response: its samples turned into loop gains, log magnitude and unwrapped phase over log frequency.
 * @throws AnalysisInputError at a sample whose loop gain is infinite or 0, and where fewer than two samples lie above frequency 0
 */
export function buildMeasuredCurve(input: MeasuredInput): MeasuredCurve {
  const { points, quantity, averages } = input.measured
  const first = points[0]?.frequency === 0 ? 1 : 0
  const count = points.length - first
  if (count < 2) throw new AnalysisInputError('measured.points needs at least two points above frequency 0.', 'measured.points')
  const [frequency, x, gain, phase, re, im] = Array.from({ length: 6 }, () => new Float64Array(count)) as [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array, Float64Array]
  const bounded = averages !== undefined && points.slice(first).every(point => point.coherence !== undefined)
  const radius = bounded ? new Float64Array(count) : null
  for (let i = 0; i < count; i++) {
    const point = points[i + first]!
    const loopGain = finiteLoopGain(input, i + first)
    const size = Math.hypot(loopGain.re, loopGain.im)
    if (size === 0) {
      throw new AnalysisInputError(`The loop gain of measured.points[${i + first}] is 0, which has no phase: leave the point out.`, `measured.points[${i + first}]`)
    }
    frequency[i] = point.frequency
    x[i] = Math.log(point.frequency)
    re[i] = loopGain.re
    im[i] = loopGain.im
    gain[i] = Math.log(size)
    const angle = Math.atan2(loopGain.im, loopGain.re)
    phase[i] = i === 0 ? angle : angle + 2 * Math.PI * Math.round((phase[i - 1]! - angle) / (2 * Math.PI))
    if (radius) {
      const distance = Math.hypot(1 + loopGain.re, loopGain.im)
      radius[i] = radiusOfLoopGain(quantity, confidenceRadius(point.coherence!, averages!), size, distance)
    }
  }
  return {
    frequency, x, gain, phase, re, im, radius,
    gainSlope: monotoneSlopes(x, gain), phaseSlope: monotoneSlopes(x, phase),
    atZero: first === 1 ? finiteLoopGain(input, 0) : null,
  }
}

function finiteLoopGain({ measured }: MeasuredInput, index: number): { re: number, im: number } {
  const point = measured.points[index]!
  const loopGain = loopGainOf(measured.quantity, point.re, point.im)
  if (!Number.isFinite(loopGain.re) || !Number.isFinite(loopGain.im) || !Number.isFinite(Math.hypot(loopGain.re, loopGain.im))) {
    throw new AnalysisInputError(`The loop gain of measured.points[${index}] (a ${measured.quantity}) is not finite: leave the point out.`, `measured.points[${index}]`)
  }
  return loopGain
}
