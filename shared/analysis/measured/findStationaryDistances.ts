import { type Cubic, cubicOfGap, derivativeOf, secondDerivativeOf, valueOf } from './cubicOfGap'
import type { MeasuredCurve } from './MeasuredCurve'

/** Pieces over which |1 + L| changes by less are dismissed: no sample tells that much. */
const smallestChange = 1e-10
/** Pieces this narrow (as part of a gap) are decided by the signs at their ends, so that every gap costs a bounded effort. */
const narrowest = 1 / 64

/**
 * The places inside a gap (0 < t < 1) at which |1 + L| of the interpolant is stationary, in rising order.
 *
 * H = g' (cos p + e^g) - p' sin p has the sign of d|1+L|^2/dt, with g + j p = log L. The gap is halved until an interval
 * bound of H shows a piece without zero, or one of H' shows H monotone there, so that its ends tell whether it has one. Left out are
 * pieces over which |1 + L| changes by less than 1e-10, and pairs of places within 1/64 of a gap.
 */
export function findStationaryDistances(curve: MeasuredCurve, gap: number): number[] {
  const gain = cubicOfGap(curve.x, curve.gain, curve.gainSlope, gap)
  const phase = cubicOfGap(curve.x, curve.phase, curve.phaseSlope, gap)
  const found: number[] = []
  searchPiece(gain, phase, 0, 1, found)
  return found
}

function searchPiece(gain: Cubic, phase: Cubic, from: number, to: number, found: number[]): void {
  const b = boundsOver(gain, phase, from, to)
  const towards = add(b.cosine, b.size)
  const h = subtract(multiply(b.gainRate, towards), multiply(b.phaseRate, b.sine))
  if (h.low > 0 || h.high < 0) return
  const bend = subtract(
    add(multiply(b.gainBend, towards), multiply(b.gainRate, subtract(multiply(b.gainRate, b.size), multiply(b.phaseRate, b.sine)))),
    add(multiply(b.phaseBend, b.sine), multiply(multiply(b.phaseRate, b.phaseRate), b.cosine)))
  const width = to - from
  if (bend.low > 0 || bend.high < 0 || width <= narrowest) {
    const root = bisectSign(gain, phase, from, to)
    if (root !== null) found.push(root)
    return
  }
  const middle = (from + to) / 2
  const atMiddle = stationarity(gain, phase, middle)
  // The mean value form is the tighter bound of H where H is all but constant.
  const spread = width / 2 * Math.max(-bend.low, bend.high)
  if (Math.abs(atMiddle) > spread) return
  const steepest = Math.min(Math.max(-h.low, h.high), Math.abs(atMiddle) + spread)
  // d|1+L|/dt = e^g H / |1+L|.
  const distance = Math.hypot(1 + Math.exp(valueOf(gain, middle)) * Math.cos(valueOf(phase, middle)), Math.exp(valueOf(gain, middle)) * Math.sin(valueOf(phase, middle)))
  if (b.size.high * steepest * width <= smallestChange * distance) return
  searchPiece(gain, phase, from, middle, found)
  if (atMiddle === 0) found.push(middle)
  searchPiece(gain, phase, middle, to, found)
}

function stationarity(gain: Cubic, phase: Cubic, t: number): number {
  const angle = valueOf(phase, t)
  return derivativeOf(gain, t) * (Math.cos(angle) + Math.exp(valueOf(gain, t))) - derivativeOf(phase, t) * Math.sin(angle)
}

/** The zero strictly inside a piece over which H is monotone, null where its ends have no opposite signs. */
function bisectSign(gain: Cubic, phase: Cubic, from: number, to: number): number | null {
  let [low, high] = [from, to]
  const atLow = Math.sign(stationarity(gain, phase, low))
  const atHigh = Math.sign(stationarity(gain, phase, high))
  if (atLow * atHigh >= 0) return null
  for (let step = 0; step < 60 && high - low > 1e-16; step++) {
    const middle = (low + high) / 2
    if (Math.sign(stationarity(gain, phase, middle)) === atLow) low = middle
    else high = middle
  }
  return (low + high) / 2
}

interface Interval {
  low: number
  high: number
}

const add = (a: Interval, b: Interval): Interval => ({ low: a.low + b.low, high: a.high + b.high })
const subtract = (a: Interval, b: Interval): Interval => ({ low: a.low - b.high, high: a.high - b.low })
function multiply(a: Interval, b: Interval): Interval {
  const [p, q, r, s] = [a.low * b.low, a.low * b.high, a.high * b.low, a.high * b.high]
  return { low: Math.min(p, q, r, s), high: Math.max(p, q, r, s) }
}

function boundsOver(gain: Cubic, phase: Cubic, from: number, to: number) {
  // Gain and phase are monotone in a gap: their ranges lie between the ends.
  const angle = between(valueOf(phase, from), valueOf(phase, to))
  return {
    size: between(Math.exp(valueOf(gain, from)), Math.exp(valueOf(gain, to))),
    cosine: cosineOver(angle.low, angle.high),
    sine: cosineOver(angle.low - Math.PI / 2, angle.high - Math.PI / 2),
    gainRate: rateOver(gain, from, to),
    phaseRate: rateOver(phase, from, to),
    gainBend: between(secondDerivativeOf(gain, from), secondDerivativeOf(gain, to)),
    phaseBend: between(secondDerivativeOf(phase, from), secondDerivativeOf(phase, to)),
  }
}

const between = (a: number, b: number): Interval => a < b ? { low: a, high: b } : { low: b, high: a }

function cosineOver(low: number, high: number): Interval {
  const turn = 2 * Math.PI
  const range = between(Math.cos(low), Math.cos(high))
  if (Math.ceil(low / turn) * turn <= high) range.high = 1
  if (Math.ceil((low - Math.PI) / turn) * turn + Math.PI <= high) range.low = -1
  return range
}

/** Range of the derivative, a parabola: its ends and its vertex. */
function rateOver(cubic: Cubic, from: number, to: number): Interval {
  const range = between(derivativeOf(cubic, from), derivativeOf(cubic, to))
  const vertex = -cubic.c2 / (3 * cubic.c3)
  if (vertex > from && vertex < to) {
    const value = derivativeOf(cubic, vertex)
    range.low = Math.min(range.low, value)
    range.high = Math.max(range.high, value)
  }
  return range
}
