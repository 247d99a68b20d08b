/**
 * Slopes at the samples of a cubic interpolant that is monotone wherever the data are: those of the cubic spline, each limited to
 * three times the smaller slope beside it and to 0 where the data turn.
 *
 * Source: J. M. Hyman, Accurate monotonicity preserving cubic interpolation, SIAM J. Sci. Stat. Comput. 4 (1983); the bound of
 * three: C. de Boor, B. Swartz, Piecewise monotone interpolation, J. Approx. Theory 21 (1977).
 *
 * @param x strictly rising, two or more
 */
export function monotoneSlopes(x: Float64Array, y: Float64Array): Float64Array {
  const count = x.length
  const secant = new Float64Array(count - 1)
  for (let i = 0; i < count - 1; i++) secant[i] = (y[i + 1]! - y[i]!) / (x[i + 1]! - x[i]!)
  const slope = splineSlopes(x, secant)
  for (let i = 0; i < count; i++) {
    const left = secant[Math.max(i - 1, 0)]!
    const right = secant[Math.min(i, count - 2)]!
    if (left * right <= 0 || slope[i]! * right <= 0) slope[i] = 0
    else slope[i] = Math.sign(right) * Math.min(Math.abs(slope[i]!), 3 * Math.abs(left), 3 * Math.abs(right))
  }
  return slope
}

/** Slopes of the cubic spline whose end slopes are those of the parabola through the last three samples (tridiagonal elimination). */
function splineSlopes(x: Float64Array, secant: Float64Array): Float64Array {
  const last = x.length - 1
  const slope = new Float64Array(last + 1)
  if (last === 1) return slope.fill(secant[0]!)
  const width = (i: number) => x[i + 1]! - x[i]!
  const parabolic = (near: number, far: number) => secant[near]! + (secant[near]! - secant[far]!) * width(near) / (width(near) + width(far))
  slope[0] = parabolic(0, 1)
  slope[last] = parabolic(last - 1, last - 2)
  const upper = new Float64Array(last + 1)
  for (let i = 1; i < last; i++) {
    const [a, c] = [1 / width(i - 1), 1 / width(i)]
    const pivot = 2 * (a + c) - a * upper[i - 1]!
    upper[i] = c / pivot
    slope[i] = (3 * (a * secant[i - 1]! + c * secant[i]!) - a * slope[i - 1]!) / pivot
  }
  for (let i = last - 1; i > 0; i--) slope[i] = slope[i]! - upper[i]! * slope[i + 1]!
  return slope
}
