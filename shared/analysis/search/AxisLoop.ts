import type { AxisExtension } from './AxisExtension'

/**
 * A loop on the imaginary axis, ready for the search: s = jv, v >= 0.
 *
 *   L(jv) = gain (jv)^originWeight prod_k (jv - root_k)^weight_k exp(-jv deadTime)
 *
 * For a continuous loop v is the frequency in rad/s. A sampled loop is mapped here exactly by z = (1 + s)/(1 - s), so that
 * v = tan(wT/2), and v = infinity is half the sampling frequency; a dead time of a sampled loop becomes the real weights
 * +-deadTime/T of the roots at s = 1 and -1.
 * Conjugate roots are both listed; roots at the origin and exactly cancelling pairs are not.
 */
export interface AxisLoop {
  gain: number
  originWeight: number
  /** Number of listed roots; the arrays below have this length. */
  count: number
  re: Float64Array
  im: Float64Array
  /** +1 a zero, -1 a pole; other values for multiple roots, and fractions for a sampled dead time */
  weight: Float64Array
  /** Relative error of L allowed for: at most sum_k correction_k / |jv - root_k|, times sqrt(1 + v^2) for a sampled loop. */
  correction: Float64Array
  hasCorrection: boolean
  /** For a pole and a zero close together compared to their distance from the axis, the index of the other; else -1. */
  partner: Int32Array
  /** The same roots for evaluation: real ones, and pairs by their upper half, each as often as it counts. */
  reals: Float64Array
  realKinds: Int8Array
  pairsRe: Float64Array
  pairsIm: Float64Array
  pairKinds: Int8Array
  /** s, of a continuous loop; 0 for a sampled one */
  deadTime: number
  /** deadTime / sampleTime of a sampled loop, else 0 */
  delayInSamples: number
  /** The roots from this index on are those of a sampled dead time. */
  delayStart: number
  /** s; undefined for a continuous loop */
  sampleTime: number | undefined
  /** Sum of all weights: L goes as v^degree for v -> infinity. */
  degree: number
  /** Undamped poles and zeros at +-jv, v > 0, in order, with the sum of their weights. */
  boundary: { v: number, weight: number }[]
  /** Poles beyond the stability boundary, cancelled ones included. */
  unstablePoles: number
  /** Poles on or beyond the boundary that a zero cancels, exactly or within 1e-9 of their size; in the loop's own variable. */
  cancelled: { re: number, im: number, onBoundary: boolean }[]
  /** Smallest and largest distance of a listed root from the origin; 1 where there is none. */
  smallestRoot: number
  largestRoot: number
  /** The part of L that is no product of factors, where there is one; counted in `originWeight` and `degree`. */
  extension?: AxisExtension
}
