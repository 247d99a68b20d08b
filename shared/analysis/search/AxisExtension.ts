import type { LogSeries } from './LogSeries'
import type { EndDemands, SettledEnd } from './settleEnd'

/**
 * A part of L that is no product of factors (sums of different dead times): it adds itself to log L wherever the search asks for that.
 * Continuous loops only.
 */
export interface AxisExtension {
  /** Further bounds of the last series added, of the kind of `LogSeries.steady`. */
  readonly steady: Float64Array
  /** ln of its size and half turns of its angle (0 or 1) at s = 0, where its own zeros at s = 0 are already part of the origin's weight. */
  readonly originLog: number
  readonly originHalfTurns: number
  /**
   * Adds its Taylor terms about jc over |v - c| <= h to a series (but for the constant one) and its remainder to the tail; a tail of Infinity
   * where the box is too large for it.
   */
  addSeries: (log: LogSeries, c: number, h: number) => void
  /** Adds itself to what `evaluateAxisLoop` writes. */
  addValue: (v: number, out: Float64Array) => void
  /** Half-length of a box from `left` that is likely to do. */
  boxHalf: (left: number) => number
  /** What can be shown of the far end of the axis. */
  settleInfinity: (demands: EndDemands) => SettledEnd
  /** True when |1 + L| is shown to be at least 1 from v to infinity. */
  staysClear: (v: number) => boolean
  /** Relative rounding of its value at v. */
  roundingAt: (v: number) => number
  /** Boxes that a search of it may take before it stops: fewer the more each costs. */
  readonly maxBoxes: number
  /** Why the number of unstable poles is not known; undefined where it is. */
  readonly openReason: string | undefined
}
