import type { EnclosedSeries } from './EnclosedSeries'
import { powerOf } from './powerOf'
import { shiftSeries } from './shiftSeries'

/**
 * How an isolation ended.
 * - `complete`: the brackets hold one root each, `undecided` holds stretches where rounding hides whether the function
 *   touches zero, and everywhere else there is none;
 * - `tail`: the truncation is what spoils it: expand about a nearer centre, or over a smaller box;
 * - `unclearFrom`, `unclearTo`: the sign at that end is within the bounds: choose another end.
 */
export type IsolationOutcome = 'complete' | 'tail' | 'unclearFrom' | 'unclearTo'

/** Stretches of y; grows as needed and is used again from call to call. */
interface Stretches { from: number[], to: number[] }

const UNIT_ROUNDOFF = 2 ** -53
/** Places where a stretch is split, as parts of its half-width: the middle first. */
const SPLITS = [0, 0.08, -0.08, 0.17, -0.17, 0.31, -0.31]
const MAX_NODES = 400
const SMALLEST_HALF_WIDTH = 2 ** -44

/**
 * Finds all roots of an enclosed series on a stretch, each in a bracket proven to hold exactly one simple root.
 *
 * On each stretch the polynomial is re-centred exactly (Taylor shift) to c_0..c_N on [-1, 1], and tested in turn:
 * (a) |c_0| > sum |c_n| + bound: no root;
 * (b) |c_1| > sum_{n>1} n |c_n| + bound: monotone, so one root or none by the signs at the ends;
 * (c) 2|c_2| > sum_{n>2} n(n-1) |c_n| + bound: convex or concave; ends of opposite sign give one root, ends of equal
 *     sign none or two by the value at the extremum, which decides a hump at 1e-12 above zero without splitting to 1e-6;
 * (d) otherwise it is split where the sign is clear.
 *
 * Rounding: re-centring and Horner's rule on degree N err by at most (2N + 2) u sum |p_n| (Higham, Accuracy and Stability
 * of Numerical Algorithms, 2002, section 5.1, with |m| + r <= 1); twice that is added to every bound, and the same for the derivatives.
 *
 * The method of tests (a) to (c) is interval Newton's (Moore, Kearfott, Cloud, Introduction to Interval Analysis, 2009,
 * chapter 8) put on Taylor models (Makino and Berz 2003).
 */
export class RootIsolator {
  /** Brackets of the last call, in order. */
  readonly from: number[] = []
  readonly to: number[] = []
  /** +1 where the function rises through the root, -1 where it falls. */
  readonly direction: number[] = []
  readonly undecided: Stretches = { from: [], to: [] }
  /** Estimate of the root in each bracket from the polynomial. */
  readonly estimate: number[] = []

  private readonly shifted = new Float64Array(40)
  private readonly stackFrom = new Float64Array(128)
  private readonly stackTo = new Float64Array(128)

  /**
   * Isolates the roots of `series` on [from, to], -1 <= from < to <= 1.
   * The results stand in the fields of this object until the next call.
   */
  isolate(series: EnclosedSeries, from: number, to: number): IsolationOutcome {
    this.from.length = this.to.length = this.direction.length = this.estimate.length = 0
    this.undecided.from.length = this.undecided.to.length = 0
    const { degree, coefficients: p, steady, tail, tailOrder } = series
    const c = this.shifted
    let sum0 = Math.abs(p[0]!)
    let sum1 = 0
    let sum2 = 0
    for (let n = 1; n <= degree; n++) {
      const size = Math.abs(p[n]!)
      sum0 += size
      sum1 += n * size
      sum2 += n * (n - 1) * size
    }
    const slack = (4 * degree + 4) * UNIT_ROUNDOFF
    const steady0 = steady[0]! + slack * sum0
    const steady1 = steady[1]! + slack * sum1
    const steady2 = steady[2]! + slack * sum2
    let top = 0
    let nodes = 0
    this.stackFrom[0] = from
    this.stackTo[0] = to
    top = 1
    while (top > 0) {
      top--
      nodes++
      const a = this.stackFrom[top]!
      const b = this.stackTo[top]!
      const middle = 0.5 * (a + b)
      const half = 0.5 * (b - a)
      const reach = Math.max(Math.abs(a), Math.abs(b))
      const tail0 = tail[0]! * powerOf(reach, tailOrder)
      const bound0 = steady0 + tail0
      shiftSeries(p, degree, middle, half, c)

      let spread = 0
      for (let n = 1; n <= degree; n++) spread += Math.abs(c[n]!)
      if (Math.abs(c[0]!) > spread + bound0) continue

      let atFrom = 0
      let atTo = 0
      for (let n = degree; n >= 0; n--) {
        atTo += c[n]!
        atFrom = c[n]! - atFrom
      }
      const tailFrom = tail[0]! * powerOf(Math.abs(a), tailOrder)
      const tailTo = tail[0]! * powerOf(Math.abs(b), tailOrder)
      if (Math.abs(atFrom) <= steady0 + tailFrom) {
        if (a === from) return 'unclearFrom'
        return 'tail'
      }
      if (Math.abs(atTo) <= steady0 + tailTo) {
        if (b === to) return 'unclearTo'
        return 'tail'
      }
      const opposite = (atFrom > 0) !== (atTo > 0)

      let bend1 = 0
      for (let n = 2; n <= degree; n++) bend1 += n * Math.abs(c[n]!)
      const bound1 = half * (steady1 + tail[1]! * powerOf(reach, tailOrder - 1))
      if (Math.abs(c[1]!) > bend1 + bound1) {
        if (opposite) this.addBracket(a, b, atTo > 0 ? 1 : -1, degree, middle, half, atFrom, atTo)
        continue
      }

      let bend2 = 0
      for (let n = 3; n <= degree; n++) bend2 += n * (n - 1) * Math.abs(c[n]!)
      const curvature = degree >= 2 ? 2 * c[2]! : 0
      const bound2 = half * half * (steady2 + tail[2]! * powerOf(reach, tailOrder - 2))
      if (Math.abs(curvature) > bend2 + bound2) {
        if (opposite) {
          this.addBracket(a, b, atTo > 0 ? 1 : -1, degree, middle, half, atFrom, atTo)
          continue
        }
        const up = curvature > 0 ? 1 : -1
        if (up * atFrom < 0) continue
        const turn = this.findExtremum(degree, up)
        const value = up * this.evaluate(degree, turn)
        const gap = 2 * Math.abs(this.evaluateSlope(degree, turn))
        const place = middle + half * turn
        if (Math.abs(turn) === 1) {
          // The polynomial falls or rises to its very end: no extremum inside unless the bound hides one there.
          if (value > bound0) continue
        }
        else if (value > bound0 + gap) continue
        else if (-value > steady0 + tail[0]! * powerOf(Math.abs(place), tailOrder)) {
          this.addBracket(a, place, -up, degree, middle, half, atFrom, -up, -1, turn)
          this.addBracket(place, b, up, degree, middle, half, -up, atTo, turn, 1)
          continue
        }
        if (tail0 > 0.5 * steady0) return 'tail'
        const least = Math.abs(curvature) - bend2 - bound2
        const width = half * Math.sqrt(Math.max(0, 2 * (Math.abs(value) + 2 * bound0 + gap) / least))
        this.undecided.from.push(Math.max(a, place - width))
        this.undecided.to.push(Math.min(b, place + width))
        continue
      }

      const split = nodes < MAX_NODES && half > SMALLEST_HALF_WIDTH && top + 2 < this.stackFrom.length
        ? this.findSplit(degree, middle, half, steady0, tail[0]!, tailOrder)
        : Number.NaN
      if (Number.isNaN(split)) {
        if (tail0 > 0.5 * steady0) return 'tail'
        this.undecided.from.push(a)
        this.undecided.to.push(b)
        continue
      }
      this.stackFrom[top] = split
      this.stackTo[top] = b
      this.stackFrom[top + 1] = a
      this.stackTo[top + 1] = split
      top += 2
    }
    return 'complete'
  }

  private findSplit(degree: number, middle: number, half: number, steady0: number, tail0: number, tailOrder: number): number {
    for (const part of SPLITS) {
      const place = middle + half * part
      const value = Math.abs(this.evaluate(degree, part))
      if (value > steady0 + tail0 * powerOf(Math.abs(place), tailOrder)) return place
    }
    return Number.NaN
  }

  private evaluate(degree: number, x: number): number {
    let value = 0
    for (let n = degree; n >= 0; n--) value = value * x + this.shifted[n]!
    return value
  }

  private evaluateSlope(degree: number, x: number): number {
    let value = 0
    for (let n = degree; n >= 1; n--) value = value * x + n * this.shifted[n]!
    return value
  }

  private evaluateCurvature(degree: number, x: number): number {
    let value = 0
    for (let n = degree; n >= 2; n--) value = value * x + n * (n - 1) * this.shifted[n]!
    return value
  }

  /** The extremum of a convex (up = 1) or concave (up = -1) polynomial on [-1, 1]. */
  private findExtremum(degree: number, up: number): number {
    if (up * this.evaluateSlope(degree, -1) >= 0) return -1
    if (up * this.evaluateSlope(degree, 1) <= 0) return 1
    let low = -1
    let high = 1
    let x = 0
    for (let i = 0; i < 60; i++) {
      const slope = up * this.evaluateSlope(degree, x)
      if (slope > 0) high = x
      else low = x
      let next = x - slope / (up * this.evaluateCurvature(degree, x))
      if (!(next > low && next < high)) next = 0.5 * (low + high)
      if (Math.abs(next - x) <= 4e-16) break
      x = next
    }
    return x
  }

  /** Adds a bracket with the polynomial's own root in it, found by Newton's method with bisection. */
  private addBracket(a: number, b: number, direction: number, degree: number, middle: number, half: number,
    atLow: number, atHigh: number, low = -1, high = 1): void {
    this.from.push(a)
    this.to.push(b)
    this.direction.push(direction)
    let x = low + (high - low) * Math.abs(atLow) / (Math.abs(atLow) + Math.abs(atHigh))
    for (let i = 0; i < 50; i++) {
      const value = direction * this.evaluate(degree, x)
      if (value > 0) high = x
      else low = x
      let next = x - value / (direction * this.evaluateSlope(degree, x))
      if (!(next > low && next < high)) next = 0.5 * (low + high)
      const step = Math.abs(next - x)
      x = next
      if (step <= 1e-9) break
    }
    this.estimate.push(middle + half * x)
  }
}
