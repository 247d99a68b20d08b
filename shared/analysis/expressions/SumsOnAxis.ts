import type { AxisExtension } from '../search/AxisExtension'
import { SERIES_DEGREE, type LogSeries } from '../search/LogSeries'
import type { EndDemands, SettledEnd } from '../search/settleEnd'
import type { DelayedSumOnAxis } from './DelayedSumOnAxis'
import type { FarEnd } from './FarEnd'
import type { SumValue } from './SumValue'

const N = SERIES_DEGREE
/** Boxes times terms times polynomials that one search may take: a few seconds. */
const EFFORT = 1e7
/** Bounds that tell of a phase that nothing is known of it (more than half a turn), the tail the larger. */
const UNKNOWN_STEADY = 4
const UNKNOWN_TAIL = 5
const HUGE = 1e200
const TWO_PI = 2 * Math.PI

/** All sums of different dead times of a loop gain as a part of it on the axis: prod Q_i^power_i. */
export class SumsOnAxis implements AxisExtension {
  readonly steady = new Float64Array(4)
  readonly originLog: number
  readonly originHalfTurns: number
  readonly maxBoxes: number
  private readonly value: SumValue = { logGain: 0, phase: 0, slopeRe: 0, slopeIm: 0, bendRe: 0, bendIm: 0 }
  private lastHalf = Infinity
  private lastTail = 0

  constructor(private readonly sums: DelayedSumOnAxis[], private readonly farEnd: FarEnd, readonly openReason: string | undefined) {
    let log = 0
    let turns = 0
    for (const sum of sums) {
      const { logGain, negative } = sum.atOrigin()
      log += sum.power * logGain
      if (negative && sum.power % 2 !== 0) turns++
    }
    this.originLog = log
    this.maxBoxes = Math.max(2000, Math.round(EFFORT / sums.reduce((total, sum) => total + sum.size, 10)))
    this.originHalfTurns = turns % 2
  }

  addSeries(log: LogSeries, c: number, h: number): void {
    const { re, im, tail } = log
    this.steady.fill(0)
    let greatest = re[0]! + 1e-9
    for (let n = 1; n <= N; n++) greatest += Math.abs(re[n]!)
    greatest += tail[0]!
    let shown = true
    let bounded = true
    let added = 0
    for (const sum of this.sums) {
      if (sum.expand(c, h)) {
        greatest += Math.abs(sum.power) * sum.spread()
      }
      else {
        shown = false
        if (sum.power < 0 || c === 0) bounded = false
        else {
          // what evaluateAxisLoop added at the centre is in re_0 already
          sum.evaluate(c, this.value)
          greatest += sum.power * (sum.greatest - this.value.logGain)
        }
      }
      if (!shown) continue
      for (let n = 1; n <= N; n++) {
        re[n] = re[n]! + sum.power * sum.re[n]!
        im[n] = im[n]! + sum.power * sum.im[n]!
      }
      const size = Math.abs(sum.power)
      for (let n = 0; n < 4; n++) {
        tail[n] = tail[n]! + size * sum.tail[n]!
        this.steady[n] = this.steady[n]! + size * sum.steady[n]!
        added += n === 0 ? size * sum.tail[0]! : 0
      }
    }
    this.lastHalf = h
    this.lastTail = shown ? added : 1
    if (shown) return
    re.fill(0)
    im.fill(0)
    tail.fill(Infinity)
    if (bounded && greatest < 0) {
      // A zero of L lies here, or may: all that is known is that ln|L| <= greatest, and nothing of the phase, anywhere on the box. Where that
      // is below the floor it settles the box; elsewhere a tail larger than the rest asks for a smaller one.
      re[0] = greatest - UNKNOWN_STEADY - UNKNOWN_TAIL
      tail.fill(HUGE)
      this.steady.fill(HUGE)
      tail[0] = UNKNOWN_TAIL
      this.steady[0] = UNKNOWN_STEADY
    }
  }

  addValue(v: number, out: Float64Array): void {
    const { value } = this
    for (const sum of this.sums) {
      sum.evaluate(v, value)
      out[0] = out[0]! + sum.power * value.logGain
      out[1] = out[1]! + sum.power * value.phase
      out[2] = out[2]! + sum.power * value.slopeRe
      out[3] = out[3]! + sum.power * value.slopeIm
      out[4] = out[4]! + sum.power * value.bendRe
      out[5] = out[5]! + sum.power * value.bendIm
    }
    out[1] = out[1]! - TWO_PI * Math.round(out[1]! / TWO_PI)
    const size = Math.exp(out[0]!)
    out[6] = size * Math.cos(out[1]!)
    out[7] = size * Math.sin(out[1]!)
  }

  boxHalf(left: number): number {
    // Neighbouring boxes are of a like size: the last one's, a little more where it left room.
    const growth = this.lastTail < 1e-7 || this.lastTail === 1 ? 2 : this.lastTail < 1e-5 ? 1.5 : 1.1
    return Math.min(Math.max(this.lastHalf * growth, 1e-10 * left), left)
  }

  settleInfinity(demands: EndDemands): SettledEnd {
    return this.farEnd.settle(demands)
  }

  staysClear(v: number): boolean {
    return this.farEnd.staysClear(v)
  }

  roundingAt(v: number): number {
    let rounding = 0
    for (const sum of this.sums) {
      sum.expand(v, 1e-3 * v)
      rounding += Math.abs(sum.power) * sum.rounding
    }
    return rounding
  }
}
