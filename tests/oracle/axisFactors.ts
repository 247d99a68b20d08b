import { dyadicOf, dyadicToNumber, shifted } from './dyadic'
import type { OracleRoots } from './ExactLoop'

/** One factor (s - r)^weight, with the sign chosen so that its angle is continuous along the axis. */
export interface AxisFactor {
  re: number
  im: number
  weight: number
}

/**
 * The loop on the axis s = jt as weighted factors: t = w for a continuous loop, t = tan(wT/2) for a sampled one, whose dead time becomes
 * ((1 - s)/(1 + s))^(deadTime/T), two factors with a real weight.
 *
 *   |L(jt)| = exp(logGain + sum weight ln|jt - r|),  arg L(jt) = angle + sum weight theta(t) - t * delay
 *
 * with theta = sign(-re) atan2(t - im, |re|); roots on the axis have theta = +-90 degrees by the side of t.
 */
export interface AxisFactors {
  logGain: number
  /** 0 or pi */
  angle: number
  factors: AxisFactor[]
  delay: number
}

/** re^2 + im^2 - 1 without cancellation. */
function beyondUnitCircle(re: number, im: number): number {
  const a = dyadicOf(re)
  const b = dyadicOf(im)
  const e = Math.min(a.exponent, b.exponent, 0)
  const square = (m: bigint, exponent: number) => shifted(m, exponent - e) ** 2n
  return dyadicToNumber(square(a.mantissa, a.exponent) + square(b.mantissa, b.exponent) - (1n << BigInt(-2 * e)), 2 * e)
}

export function axisFactors(input: OracleRoots): AxisFactors {
  const { sampleTime: period, deadTime = 0 } = input
  let logGain = Math.log(Math.abs(input.gain))
  let angle = input.gain < 0 ? Math.PI : 0
  const factors: AxisFactor[] = []
  const flip = () => {
    angle = Math.PI - angle
  }
  const place = (re: number, im: number, weight: number) => {
    if (im === 0 && re > 0) flip()
    factors.push({ re, im, weight })
  }
  /** (1 - s)^weight: the sign is already that of the continuous angle */
  const placeAtOne = (weight: number) => factors.push({ re: 1, im: 0, weight })
  for (const [list, weight] of [[input.zeros, 1], [input.poles, -1]] as const) {
    for (const [re, im] of list) {
      if (period === undefined) {
        place(re, im, weight)
        continue
      }
      // z - r = (1 + r)(s - r')/(1 - s), r' = (r - 1)/(r + 1); for r = -1 it is 2/(1 - s)
      placeAtOne(-weight)
      if (re === -1 && im === 0) {
        logGain += weight * Math.LN2
        continue
      }
      const size = (re + 1) ** 2 + im ** 2
      logGain += weight * Math.log(size) / 2
      if (im === 0 && re < -1) flip()
      place(im === 0 ? (re - 1) / (re + 1) : beyondUnitCircle(re, im) / size, im === 0 ? 0 : 2 * im / size, weight)
    }
  }
  if (period !== undefined && deadTime > 0) {
    placeAtOne(deadTime / period)
    factors.push({ re: -1, im: 0, weight: -deadTime / period })
  }
  return { logGain, angle, factors, delay: period === undefined ? deadTime : 0 }
}

/** Continuous angle of L at t, in radians; `side` decides for a root on the axis at t itself. */
export function angleOnAxis(loop: AxisFactors, t: number, side: -1 | 1 = 1): number {
  let sum = loop.angle - (loop.delay === 0 ? 0 : t * loop.delay)
  for (const { re, im, weight } of loop.factors) {
    const d = t - im
    sum += weight * (re === 0 ? (d > 0 || (d === 0 && side > 0) ? Math.PI / 2 : -Math.PI / 2) : re < 0 ? Math.atan2(d, -re) : -Math.atan2(d, re))
  }
  return sum
}

/** ln |L| at t. */
export function logGainOnAxis(loop: AxisFactors, t: number): number {
  let sum = loop.logGain
  for (const { re, im, weight } of loop.factors) sum += weight * Math.log(Math.hypot(re, t - im))
  return sum
}

/** ln |L| as t grows without bound: infinite where L vanishes or grows there. */
export function endLogGain(loop: AxisFactors): number {
  const excess = Math.round(loop.factors.reduce((sum, f) => sum + f.weight, 0))
  return excess === 0 ? loop.logGain : excess * Number.POSITIVE_INFINITY
}

/** The same loop over u = 1/t: its value at u is the conjugate of that of the given loop at 1/u. No dead time of its own. */
export function overReciprocal(loop: AxisFactors): AxisFactors {
  const inverted: AxisFactors = { logGain: loop.logGain, angle: 0, factors: [], delay: 0 }
  let atZero = 0
  for (const { re, im, weight } of loop.factors) {
    // s - r = -r (1/s - 1/r) / (1/s)
    atZero -= weight
    const size = re * re + im * im
    if (size === 0) continue
    inverted.logGain += weight * Math.log(size) / 2
    inverted.factors.push({ re: re / size, im: im / size, weight })
  }
  atZero = Math.round(atZero)
  if (atZero !== 0) inverted.factors.push({ re: 0, im: 0, weight: atZero })
  // the constant angle follows from one point, at which no root stands
  const at = [0.7316, 0.8141, 0.9233].find(t => loop.factors.every(f => f.re !== 0 || Math.abs(f.im - t) > 1e-3))!
  inverted.angle = -angleOnAxis(loop, at) - angleOnAxis(inverted, 1 / at)
  return inverted
}
