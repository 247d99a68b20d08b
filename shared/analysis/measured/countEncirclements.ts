import { leastDistanceBetween } from './leastDistanceBetween'
import type { MeasuredCurve } from './MeasuredCurve'

/** Counter-clockwise encirclements of -1 by the whole locus (negative frequencies included), or why they cannot be counted. */
export type EncirclementCount = { encirclements: number } | { reason: string }

/** |L| at the upper end of the data up to which the locus is taken to stay inside the unit circle from there on. */
const smallAtEnd = 0.5
/** |L| at the lower end under which it is taken to stay small towards frequency 0. */
const smallAtStart = 0.3
/** |L| at the lower end from which the asymptote of stated integrators is taken to hold. */
const largeAtStart = 3
const radians = Math.PI / 180

/**
 * Counts the encirclements of -1 from the samples. Between two samples 1 + L is taken to turn the shorter way, which holds where
 * no gap is open to the other side of -1; the ends of the data are closed on what is stated and what the samples there show:
 * - above: |L| is at most 0.5 and taken to stay under 1;
 * - below: `originPoles` m >= 1, |L| at least 3 and a phase within 50 deg of -m 90 deg or its opposite: the arc of the indentation;
 *   none: a phase within 20 deg of the real axis and |1 + L| at least 0.5; or |L| at most 0.3, taken to stay so.
 *
 * @param originPoles poles at s = 0, undefined where not stated
 * @param sign -1 counts for the locus of -L, to tell whether the sign of the measured response explains a contradiction
 */
export function countEncirclements(curve: MeasuredCurve, originPoles: number | undefined, sign: 1 | -1 = 1): EncirclementCount {
  const { re, im } = curve
  const last = re.length - 1
  const sizeAtEnd = Math.hypot(re[last]!, im[last]!)
  if (sizeAtEnd > smallAtEnd) return { reason: `the data end where the loop gain is still ${sizeAtEnd.toPrecision(3)}, not well under 1` }
  const start = startOf(curve, originPoles, sign)
  if ('reason' in start) return start
  let turned = start.turned
  for (let i = 0; i < last; i++) turned += turnBetween(sign * re[i]!, sign * im[i]!, sign * re[i + 1]!, sign * im[i + 1]!)
  // |L| < 1 from the last sample on: arg(1 + L) goes to the nearest whole turn.
  const whole = 2 * Math.PI * Math.round((start.from + turned) / (2 * Math.PI))
  const encirclements = Math.round((2 * (whole - start.from) - (originPoles ?? 0) * Math.PI) / (2 * Math.PI))
  return { encirclements: encirclements === 0 ? 0 : encirclements }
}

/** Change of arg(1 + L) from one value of L to another by the shorter way. */
function turnBetween(ar: number, ai: number, br: number, bi: number): number {
  return Math.atan2((1 + ar) * bi - ai * (1 + br), (1 + ar) * (1 + br) + ai * bi)
}

/** arg(1 + L) at frequency 0+ and how far it turns from there to the first sample. */
function startOf(curve: MeasuredCurve, originPoles: number | undefined, sign: 1 | -1): { from: number, turned: number } | { reason: string } {
  const [re, im] = [sign * curve.re[0]!, sign * curve.im[0]!]
  const size = Math.hypot(re, im)
  const angle = Math.atan2(im, re)
  const here = Math.atan2(im, 1 + re)
  if (curve.atZero !== null) return startAtZero(sign * curve.atZero.re, sign * curve.atZero.im, re, im, originPoles ?? 0)
  if (originPoles !== undefined && originPoles > 0) {
    if (size < largeAtStart) return { reason: `the data start where the loop gain is ${size.toPrecision(3)}, too small for the ${originPoles} stated poles at the origin to rule it` }
    const steps = Math.round((angle + originPoles * Math.PI / 2) / Math.PI)
    const from = steps * Math.PI - originPoles * Math.PI / 2
    if (Math.abs(angle - from) > 50 * radians) return { reason: `the phase at the first sample is not near that of the ${originPoles} stated poles at the origin` }
    // |L| > 1: arg(1 + L) is within a quarter turn of arg L and turns with it.
    return { from, turned: angle - from + Math.atan2(im, re * re + im * im + re) }
  }
  if (size <= smallAtStart) return { from: 0, turned: here }
  const fromReal = Math.abs(Math.sin(angle))
  if (fromReal > Math.sin(20 * radians)) return { reason: 'the phase at the first sample is not near 0 or 180 deg, and poles at the origin are not stated' }
  if (Math.hypot(1 + re, im) < 0.5) return { reason: 'the data start so near -1 that its side cannot be told' }
  if (re > 0) return { from: 0, turned: here }
  if (size < 1) return { from: 0, turned: here }
  if (originPoles === undefined) return { reason: 'the phase at the first sample is near 180 deg: whether by poles at the origin or a negative gain is not stated' }
  const from = im < 0 ? -Math.PI : Math.PI
  return { from, turned: here - from }
}

function startAtZero(zeroRe: number, zeroIm: number, re: number, im: number, originPoles: number): { from: number, turned: number } | { reason: string } {
  if (originPoles > 0) return { reason: 'a sample at frequency 0 contradicts the stated poles at the origin' }
  if (Math.abs(zeroIm) > 1e-3 * Math.abs(zeroRe)) return { reason: 'the sample at frequency 0 is not real' }
  if (leastDistanceBetween(zeroRe, zeroIm, re, im) === 0) return { reason: 'between frequency 0 and the next sample the locus may pass -1 on either side' }
  const from = Math.atan2(0, 1 + zeroRe)
  return { from, turned: turnBetween(zeroRe, 0, re, im) }
}
