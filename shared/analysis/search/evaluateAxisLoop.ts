import type { AxisLoop } from './AxisLoop'

/** What `evaluateAxisLoop` writes. */
export const LOG_GAIN = 0
/** arg L, rad, in [-pi, pi] */
export const PHASE = 1
/** d ln|L|/dv and d arg L/dv */
export const LOG_GAIN_SLOPE = 2
export const PHASE_SLOPE = 3
/** Second derivatives of ln|L| and arg L. */
export const LOG_GAIN_BEND = 4
export const PHASE_BEND = 5
/** Re L and Im L; infinite or zero where ln|L| leaves the range of doubles */
export const RE = 6
export const IM = 7
export const AXIS_VALUE_SIZE = 8

/** Products are scaled back beyond these, far enough from the ends of the doubles to square a quotient of two. */
const BIG = 2 ** 120
const SMALL = 2 ** -120
const STEP = 120
const LN2 = Math.LN2
const TWO_PI = 2 * Math.PI

/**
 * L(jv) with first and second derivatives of its logarithm, from the factors: real ones, and pairs as
 * a^2 + (b - v)(b + v) - 2jav, where nothing cancels however light the damping.
 * Relative error of L: at most 5 (factors + 2) u, and 2u (v deadTime + pi delayInSamples) of its phase. v > 0, not at a boundary root.
 */
export function evaluateAxisLoop(axis: AxisLoop, v: number, out: Float64Array): void {
  const { reals, realKinds, pairsRe, pairsIm, pairKinds, originWeight } = axis
  let upRe = axis.gain
  let upIm = 0
  let downRe = 1
  let downIm = 0
  let exponent = 0
  let slopeRe = 0
  let slopeIm = 0
  let bendRe = 0
  let bendIm = 0
  // A root nearer to the origin than v adds 1/v to d ln|L|/dv and little else: the 1/v are counted, what is left is added, so that nothing cancels far out.
  let common = 0
  for (let k = 0; k < reals.length; k++) {
    const a = reals[k]!
    // j/(jv - a) = (v - ja)/(v^2 + a^2)
    const scale = 1 / (v * v + a * a)
    const dRe = v * scale
    const dIm = -a * scale
    const inner = a * a < v * v
    const ownRe = inner ? -a * a * scale / v : dRe
    if (inner) common += realKinds[k]!
    if (realKinds[k]! > 0) {
      const t = -a * upRe - v * upIm
      upIm = -a * upIm + v * upRe
      upRe = t
      slopeRe += ownRe
      slopeIm += dIm
      bendRe -= dRe * dRe - dIm * dIm
      bendIm -= 2 * dRe * dIm
      const size = Math.abs(upRe) + Math.abs(upIm)
      if (size > BIG) {
        upRe *= SMALL
        upIm *= SMALL
        exponent += STEP
      }
      else if (size < SMALL) {
        upRe *= BIG
        upIm *= BIG
        exponent -= STEP
      }
    }
    else {
      const t = -a * downRe - v * downIm
      downIm = -a * downIm + v * downRe
      downRe = t
      slopeRe -= ownRe
      slopeIm -= dIm
      bendRe += dRe * dRe - dIm * dIm
      bendIm += 2 * dRe * dIm
      const size = Math.abs(downRe) + Math.abs(downIm)
      if (size > BIG) {
        downRe *= SMALL
        downIm *= SMALL
        exponent -= STEP
      }
      else if (size < SMALL) {
        downRe *= BIG
        downIm *= BIG
        exponent += STEP
      }
    }
  }
  for (let k = 0; k < pairsRe.length; k++) {
    const a = pairsRe[k]!
    const b = pairsIm[k]!
    const x = a * a + (b - v) * (b + v)
    const y = -2 * a * v
    const scale = 1 / (x * x + y * y)
    // P'/P and P''/P of P = x + jy: P' = -2v - 2ja, P'' = -2
    const rRe = x * scale
    const rIm = -y * scale
    const dRe = -2 * (v * rRe - a * rIm)
    const dIm = -2 * (v * rIm + a * rRe)
    const size2 = a * a + b * b
    const inner = size2 < v * v
    const ownRe = inner ? -2 * (size2 * rRe + a * v * rIm) / v : dRe
    if (inner) common += 2 * pairKinds[k]!
    const sRe = -2 * rRe - (dRe * dRe - dIm * dIm)
    const sIm = -2 * rIm - 2 * dRe * dIm
    if (pairKinds[k]! > 0) {
      const t = x * upRe - y * upIm
      upIm = x * upIm + y * upRe
      upRe = t
      slopeRe += ownRe
      slopeIm += dIm
      bendRe += sRe
      bendIm += sIm
      const size = Math.abs(upRe) + Math.abs(upIm)
      if (size > BIG) {
        upRe *= SMALL
        upIm *= SMALL
        exponent += STEP
      }
      else if (size < SMALL) {
        upRe *= BIG
        upIm *= BIG
        exponent -= STEP
      }
    }
    else {
      const t = x * downRe - y * downIm
      downIm = x * downIm + y * downRe
      downRe = t
      slopeRe -= ownRe
      slopeIm -= dIm
      bendRe -= sRe
      bendIm -= sIm
      const size = Math.abs(downRe) + Math.abs(downIm)
      if (size > BIG) {
        downRe *= SMALL
        downIm *= SMALL
        exponent -= STEP
      }
      else if (size < SMALL) {
        downRe *= BIG
        downIm *= BIG
        exponent += STEP
      }
    }
  }
  const scale = 1 / (downRe * downRe + downIm * downIm)
  let re = (upRe * downRe + upIm * downIm) * scale
  let im = (upIm * downRe - upRe * downIm) * scale
  // Whatever of |L| does not fit into re and im.
  let outside = 0
  if (originWeight !== 0) {
    const turns = ((originWeight % 4) + 4) % 4
    for (let i = 0; i < turns; i++) {
      const t = -im
      im = re
      re = t
    }
    bendRe -= originWeight / v / v
    const power = v ** originWeight
    if (power > SMALL && power < BIG) {
      re *= power
      im *= power
    }
    else outside = originWeight * Math.log(v)
  }
  slopeRe += (originWeight + common) / v
  if (exponent !== 0) {
    if (Math.abs(exponent) === STEP) {
      re *= 2 ** exponent
      im *= 2 ** exponent
    }
    else outside += exponent * LN2
  }
  const logGain = 0.5 * Math.log(re * re + im * im) + outside
  let phase = Math.atan2(im, re)
  if (axis.deadTime !== 0) {
    phase -= v * axis.deadTime
    slopeIm -= axis.deadTime
  }
  if (axis.delayInSamples !== 0) {
    const turn = 2 * axis.delayInSamples / (1 + v * v)
    phase -= 2 * axis.delayInSamples * Math.atan(v)
    slopeIm -= turn
    bendIm += 2 * v * turn / (1 + v * v)
  }
  if (outside !== 0 || axis.deadTime !== 0 || axis.delayInSamples !== 0) {
    phase -= TWO_PI * Math.round(phase / TWO_PI)
    const size = Math.exp(logGain)
    re = size * Math.cos(phase)
    im = size * Math.sin(phase)
  }
  out[0] = logGain
  out[1] = phase
  out[2] = slopeRe
  out[3] = slopeIm
  out[4] = bendRe
  out[5] = bendIm
  out[6] = re
  out[7] = im
  axis.extension?.addValue(v, out)
}
