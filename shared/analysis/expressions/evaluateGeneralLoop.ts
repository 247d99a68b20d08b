import type { LoopGain } from '../LoopGain'
import { AXIS_VALUE_SIZE, IM, RE, evaluateAxisLoop } from '../search/evaluateAxisLoop'
import { expandEnd } from '../search/expandEnd'
import { LogSeries } from '../search/LogSeries'
import type { GeneralLoop } from './GeneralLoop'
import { generalAxisLoop } from './generalAxisLoop'

/** A loop gain with several dead times, ready to be evaluated for figures and tables. */
export function evaluateGeneralLoop(loop: GeneralLoop): LoopGain {
  const axis = generalAxisLoop(loop, 'not counted')
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const { log, weight } = expandEnd(axis, 'origin', 0.1 * axis.smallestRoot, new LogSeries())
  const atOrigin = weight > 0 ? 0 : weight < 0 ? Infinity : Math.exp(log.re[0]!) * Math.cos(log.im[0]!)
  const evaluate = (w: number, out: Float64Array) => {
    if (!(w >= 0)) return false
    if (w === 0 || w === Infinity) {
      out[0] = w === 0 ? atOrigin : axis.degree < 0 ? 0 : Number.NaN
      out[1] = 0
      return Number.isFinite(out[0])
    }
    evaluateAxisLoop(axis, w, value)
    out[0] = value[RE]!
    out[1] = value[IM]!
    return Number.isFinite(out[0]) && Number.isFinite(out[1])
  }
  const features: LoopGain['features'] = []
  for (const list of [loop.rational.zeros, loop.rational.poles, ...loop.polynomials]) {
    for (let k = 0; k < list.re.length; k++) {
      if (list.im[k]! < 0) continue
      const frequency = Math.hypot(list.re[k]!, list.im[k]!)
      if (frequency > 0) features.push({ frequency, width: Math.abs(list.re[k]!) })
    }
  }
  features.sort((x, y) => x.frequency - y.frequency)
  const delays = loop.sums.map(sum => Math.max(...sum.terms.map(term => term.deadTime)) * Math.abs(sum.power))
  return { evaluate, axisEnd: Infinity, axisStart: 0, features, deadTime: loop.rational.deadTime + delays.reduce((a, b) => a + b, 0) }
}
