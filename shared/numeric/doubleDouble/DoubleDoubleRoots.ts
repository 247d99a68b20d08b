/** Roots of a real polynomial as double-doubles, conjugates both listed and exact. */
export interface DoubleDoubleRoots {
  re: Float64Array
  reLow: Float64Array
  im: Float64Array
  imLow: Float64Array
  /** |W_k|, the Weierstrass correction left: the polynomial differs from the product of these factors by a relative amount of about sum W_k / |s - r_k|. */
  correction: Float64Array
}
