import type { AxisLoop } from './AxisLoop'
import { AXIS_VALUE_SIZE, evaluateAxisLoop } from './evaluateAxisLoop'

/** What is zero at the find: ln|L|; arg L - 180 deg; the slope of |1 + L|^2; the slope of |1 + 1/L|^2. */
export type FindKind = 'gain' | 'phase' | 'distance' | 'inverseDistance'

const TWO_PI = 2 * Math.PI
const MAX_STEPS = 80

/**
 * Refines a find inside its proven bracket by Newton's method on the factors themselves, with bisection where a step would
 * leave the bracket. `direction` is the sign of the slope through the find.
 * Afterwards `v`, `logGain` and `phase` hold the find; it returns false where it ran out of steps.
 */
export class FindRefiner {
  v = 0
  logGain = 0
  phase = 0
  readonly value = new Float64Array(AXIS_VALUE_SIZE)
  private residual = 0
  private slope = 0

  constructor(private readonly axis: AxisLoop) {}

  refine(kind: FindKind, start: number, from: number, to: number, direction: number): boolean {
    let low = from
    let high = to
    let v = start
    let lastStep = Number.POSITIVE_INFINITY
    for (let i = 0; i < MAX_STEPS; i++) {
      this.measure(kind, v)
      const value = direction * this.residual
      if (value === 0) return this.settle(v, 0)
      if (value > 0) high = v
      else low = v
      const step = -this.residual / this.slope
      const size = Math.abs(step)
      const next = v + step
      const inside = next >= low && next <= high
      if (inside || size <= 1e-13 * v) {
        // The next step would be of the order of size^2 over the bracket's width; noise no longer shrinks.
        if (size <= 1e-7 * (to - from) || size <= 1e-15 * v || (size >= 0.5 * lastStep && size <= 1e-9 * v)) {
          return this.settle(v, Math.min(Math.max(step, from - v), to - v))
        }
      }
      lastStep = size
      const target = inside ? next : 0.5 * (low + high)
      if (target === v || high - low <= 1e-16 * v) return this.settle(v, 0)
      v = target
    }
    this.measure(kind, 0.5 * (low + high))
    this.settle(0.5 * (low + high), 0)
    return false
  }

  private settle(v: number, step: number): boolean {
    const value = this.value
    this.v = v + step
    this.logGain = value[0]! + step * value[2]!
    this.phase = value[1]! + step * value[3]!
    return true
  }

  private measure(kind: FindKind, v: number): void {
    const value = this.value
    evaluateAxisLoop(this.axis, v, value)
    if (kind === 'gain') {
      this.residual = value[0]!
      this.slope = value[2]!
      return
    }
    if (kind === 'phase') {
      const offset = value[1]! - Math.PI
      this.residual = offset - TWO_PI * Math.round(offset / TWO_PI)
      this.slope = value[3]!
      return
    }
    const sign = kind === 'distance' ? 1 : -1
    const m1 = sign * value[2]!
    const p1 = sign * value[3]!
    const m2 = sign * value[4]!
    const p2 = sign * value[5]!
    const m = sign * value[0]!
    const cos = Math.cos(value[1]!)
    const sin = sign * Math.sin(value[1]!)
    // Half the slope of |1 + L|^2 over |L|: m'(|L| + cos) - phi' sin, scaled by max(1, |L|).
    const size = Math.exp(-Math.abs(m))
    const a = m > 0 ? 1 : size
    const b = m > 0 ? size : 1
    this.residual = m1 * (a + b * cos) - p1 * b * sin
    // Its own slope, with the scale and the factor |L| (both positive) held at their value here.
    const inner = m1 * m1 - p1 * p1 + m2
    const outer = 2 * m1 * p1 + p2
    this.slope = a * (2 * m1 * m1 + m2) + b * (cos * inner - sin * outer)
  }
}
