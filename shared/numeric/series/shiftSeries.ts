/**
 * Re-centres a polynomial: writes c with p(middle + half x) = sum c_n x^n into `out` (Taylor shift by repeated
 * synthetic division). With |middle| + |half| <= 1 the error of each c_n is at most 2 degree u sum |p_n|.
 */
export function shiftSeries(p: Float64Array, degree: number, middle: number, half: number, out: Float64Array): void {
  for (let n = 0; n <= degree; n++) out[n] = p[n]!
  if (middle !== 0) {
    for (let i = 0; i < degree; i++) {
      let carry = out[degree]!
      for (let n = degree - 1; n >= i; n--) {
        carry = out[n]! + middle * carry
        out[n] = carry
      }
    }
  }
  let scale = half
  for (let n = 1; n <= degree; n++) {
    out[n] = out[n]! * scale
    scale *= half
  }
}
