/**
 * A real function on -1 <= y <= 1 known as a polynomial and rigorous bounds of what the polynomial leaves out:
 *
 *   f(y) = sum_{n <= degree} coefficients[n] y^n + r(y)
 *   |r^(k)(y)| <= steady[k] + tail[k] |y|^(tailOrder - k)        k = 0, 1, 2
 *
 * `tail` is the truncation, which shrinks towards the centre; `steady` is everything that does not (rounding,
 * errors of the model). The bounds need not hold the rounding of working on the polynomial itself.
 */
export interface EnclosedSeries {
  degree: number
  coefficients: Float64Array
  steady: Float64Array
  tail: Float64Array
  tailOrder: number
}
