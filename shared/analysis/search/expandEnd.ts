import type { AxisLoop } from './AxisLoop'
import type { LogSeries } from './LogSeries'
import { SERIES_DEGREE } from './LogSeries'

const N = SERIES_DEGREE
const HALF_PI = Math.PI / 2

export type AxisEnd = 'origin' | 'infinity'

/**
 * The series of log L at an end of the axis, in x = v at the origin and x = 1/v at infinity, over 0 < x <= reach:
 *
 *   log L = weight ln x + sum_n (re_n + j im_n) (x/reach)^n + r
 *
 * From log(jv - r) = log(-r) + log(1 - jv/r) and log(jv - r) = log(jv) + log(1 + jr/v). The roots are symmetric about the real
 * axis, so Re is even and Im is odd in x but for its constant; that is imposed.
 * `quarterTurns` is arg L at the end in quarter turns where it is a whole number of them, else NaN (a sampled dead time that is
 * no whole number of samples, at half the sampling frequency); im_0 is that angle in (-pi, pi].
 */
export interface EndSeries {
  log: LogSeries
  weight: number
  reach: number
  quarterTurns: number
}

export function expandEnd(axis: AxisLoop, end: AxisEnd, reach: number, log: LogSeries): EndSeries {
  const origin = end === 'origin'
  const { re, im, tail } = log
  re.fill(0)
  im.fill(0)
  tail.fill(0)
  log.centre = 0
  log.half = reach
  let absolute = 0
  let error = 0
  let bend = 0
  let constant = Math.log(Math.abs(axis.gain))
  let positive = 0
  for (let k = 0; k < axis.count; k++) {
    const a = axis.re[k]!
    const b = axis.im[k]!
    const weight = axis.weight[k]!
    const size = Math.hypot(a, b)
    const qRe = reach * (origin ? (-b / size) / size : -b)
    const qIm = reach * (origin ? (-a / size) / size : a)
    if (origin) {
      constant += weight * Math.log(size)
      if (b === 0 && a > 0 && k < axis.delayStart) positive += weight
    }
    let pRe = weight * qRe
    let pIm = weight * qIm
    for (let n = 1; n <= N; n++) {
      if (n % 2 === 0) re[n] = re[n]! + pRe / n
      else im[n] = im[n]! + pIm / n
      const t = -(pRe * qRe - pIm * qIm)
      pIm = -(pRe * qIm + pIm * qRe)
      pRe = t
    }
    const rho = Math.hypot(qRe, qIm)
    const geometric = 1 / (1 - rho)
    const weightSize = Math.abs(weight)
    absolute += weightSize * rho * geometric
    const last = weightSize * rho ** (N + 1) * geometric
    tail[0] = tail[0]! + last
    tail[2] = tail[2]! + last * (N + rho * geometric)
    tail[3] = tail[3]! + last * (N * (N - 1) + 2 * N * rho * geometric + 2 * rho * rho * geometric * geometric)
    if (axis.hasCorrection) {
      const shift = axis.correction[k]!
      const sampled = axis.sampleTime !== undefined
      // W/|jv - r| is W/size at the origin and W/v at infinity; W |1 - jv|/|jv - r| of a sampled loop is W at infinity.
      const there = origin ? (sampled ? Math.hypot(1, reach) : 1) / size : sampled ? Math.hypot(1, reach) : reach
      error += shift * there
      bend += shift * (origin ? (there + (sampled ? 1 : 0)) * rho : sampled ? (1 + size) * reach : reach)
    }
  }
  tail[1] = tail[0]!
  tail[0] = tail[0]! / (N + 1)
  if (origin) im[1] = im[1]! - reach * axis.deadTime
  let extraTurns = 0
  if (origin && axis.extension) {
    axis.extension.addSeries(log, 0, reach)
    constant += axis.extension.originLog
    extraTurns = 2 * axis.extension.originHalfTurns
    for (let n = 1; n <= N; n++) (n % 2 === 0 ? im : re)[n] = 0
  }
  const weight = origin ? axis.originWeight : -axis.degree
  // A sampled dead time turns by 2 nu atan(v): nothing at the origin, nu half turns at half the sampling frequency.
  const halfTurns = origin ? 0 : axis.delayInSamples
  const turns = extraTurns + (axis.gain < 0 ? 2 : 0) + 2 * positive + (origin ? weight : axis.degree) - 2 * halfTurns
  const wrapped = turns - 4 * Math.ceil((turns - 2) / 4)
  re[0] = constant
  im[0] = wrapped * HALF_PI
  log.bound(axis, absolute, 0, error, bend, origin ? reach : 0)
  // Each logarithm of the constant errs by a unit of its own size.
  const logarithms = 2 ** -52 * (Math.abs(Math.log(Math.abs(axis.gain))) + axis.count * 40)
  log.steady[0] = log.steady[0]! + logarithms
  log.steadyRe[0] = log.steadyRe[0]! + logarithms
  // Half a sample of dead time also ends on an axis, but there L is not real and |1 + L| not even about the end.
  const whole = Number.isInteger(wrapped) && (origin || Number.isInteger(halfTurns))
  return { log, weight, reach, quarterTurns: whole ? wrapped : Number.NaN }
}
