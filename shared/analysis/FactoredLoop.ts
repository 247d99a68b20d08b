/**
 * A rational loop with dead time as a product of factors: what the proven search works on.
 *
 *   L(v) = gain * prod_k (v - zero_k) / prod_k (v - pole_k) * exp(-s deadTime),  v = s, or z = exp(s sampleTime)
 *
 * Conjugate roots are both listed. Roots are in rad/s (v = s) or plain numbers (v = z).
 */
export interface FactoredLoop {
  gain: number
  zeros: FactorList
  poles: FactorList
  /** s, at least 0 */
  deadTime: number
  /** s; undefined for a continuous loop */
  sampleTime?: number
}

export interface FactorList {
  re: Float64Array
  im: Float64Array
  /**
   * Proven bound W_k of the Weierstrass correction of each root: the polynomial meant differs from the product of
   * these factors by a relative amount of at most sum_k W_k / |v - root_k| at every v. All zero for factors as given.
   */
  correction: Float64Array
  /**
   * 1 where the root (or the cluster it was replaced for) counts as on the stability boundary: then it lies exactly
   * on the axis Re s = 0, or for v = z exactly at 1 or -1 or within a unit roundoff of the unit circle.
   */
  onBoundary: Uint8Array
}
