import { type Cubic, derivativeOf, valueOf } from './cubicOfGap'

/**
 * The t in [0, 1] at which a monotone cubic takes a level between its two ends: Newton inside a bracket that bisection keeps
 * closing, to the last digits of t.
 */
export function solveMonotoneCubic(cubic: Cubic, level: number): number {
  let [low, high] = [0, 1]
  const rising = valueOf(cubic, 1) > cubic.c0
  let t = (level - cubic.c0) / (valueOf(cubic, 1) - cubic.c0)
  for (let step = 0; step < 100; step++) {
    const error = valueOf(cubic, t) - level
    if (error === 0) return t
    if ((error > 0) === rising) high = t
    else low = t
    const newton = t - error / derivativeOf(cubic, t)
    const next = newton > low && newton < high ? newton : (low + high) / 2
    if (Math.abs(next - t) <= 2e-16 || high - low <= 2e-16) return next
    t = next
  }
  return t
}
