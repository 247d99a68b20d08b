import type { FactoredLoop } from './FactoredLoop'
import type { LoopGain } from './LoopGain'
import { axisLoopFromFactors } from './search/axisLoopFromFactors'
import { AXIS_VALUE_SIZE, IM, RE, evaluateAxisLoop } from './search/evaluateAxisLoop'
import { expandEnd } from './search/expandEnd'
import { LogSeries } from './search/LogSeries'

const HALF_SAMPLING = 1e-12

/** A loop given by its factors, ready to be evaluated for figures and tables. */
export function prepareFactoredGain(loop: FactoredLoop): LoopGain {
  const axis = axisLoopFromFactors(loop)
  const time = axis.sampleTime
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const origin = endValue(axis, 'origin')
  const infinity = endValue(axis, 'infinity')
  const axisEnd = time === undefined ? Number.POSITIVE_INFINITY : Math.PI / time
  const toFrequency = (v: number) => time === undefined ? v : 2 * Math.atan(v) / time
  const evaluate = (w: number, out: Float64Array) => {
    if (!(w >= 0) || w > axisEnd * (1 + HALF_SAMPLING)) return false
    const atEnd = w === 0 ? origin : w >= axisEnd * (1 - HALF_SAMPLING) ? infinity : undefined
    if (atEnd) {
      out[0] = atEnd.re
      out[1] = atEnd.im
      return Number.isFinite(atEnd.re)
    }
    evaluateAxisLoop(axis, time === undefined ? w : Math.tan(0.5 * w * time), value)
    out[0] = value[RE]!
    out[1] = value[IM]!
    return Number.isFinite(out[0]) && Number.isFinite(out[1])
  }
  const features: LoopGain['features'] = []
  for (let k = 0; k < axis.count; k++) {
    const a = axis.re[k]!
    const b = axis.im[k]!
    if (b < 0) continue
    const place = Math.hypot(a, b)
    // dv/dw of the bilinear map turns widths into rad/s.
    const stretch = time === undefined ? 1 : 2 / time / (1 + place * place)
    features.push({ frequency: toFrequency(place), width: Math.abs(a) * stretch })
  }
  features.sort((x, y) => x.frequency - y.frequency)
  return { evaluate, axisEnd, axisStart: 0, features, deadTime: loop.deadTime }
}

/** L at an end of the axis; infinite or NaN where it has no value. */
function endValue(axis: ReturnType<typeof axisLoopFromFactors>, end: 'origin' | 'infinity'): { re: number, im: number } {
  const reach = end === 'origin' ? 0.1 * axis.smallestRoot : 0.1 / axis.largestRoot
  const { log, weight } = expandEnd(axis, end, reach, new LogSeries())
  if (weight < 0) return { re: Number.POSITIVE_INFINITY, im: 0 }
  if (weight > 0) return { re: 0, im: 0 }
  const size = Math.exp(log.re[0]!)
  return { re: size * Math.cos(log.im[0]!), im: size * Math.sin(log.im[0]!) }
}
