/** A quantity in one gap as c0 + c1 t + c2 t^2 + c3 t^3, t from 0 at the left sample to 1 at the right one. */
export interface Cubic {
  c0: number
  c1: number
  c2: number
  c3: number
}

/** The Hermite cubic of gap `gap` through the values `y` with slopes `slope` (per unit of x). */
export function cubicOfGap(x: Float64Array, y: Float64Array, slope: Float64Array, gap: number): Cubic {
  const width = x[gap + 1]! - x[gap]!
  const step = y[gap + 1]! - y[gap]!
  const c1 = slope[gap]! * width
  const end = slope[gap + 1]! * width
  return { c0: y[gap]!, c1, c2: 3 * step - 2 * c1 - end, c3: c1 + end - 2 * step }
}

export const valueOf = ({ c0, c1, c2, c3 }: Cubic, t: number) => c0 + t * (c1 + t * (c2 + t * c3))
export const derivativeOf = ({ c1, c2, c3 }: Cubic, t: number) => c1 + t * (2 * c2 + t * 3 * c3)
export const secondDerivativeOf = ({ c2, c3 }: Cubic, t: number) => 2 * c2 + 6 * c3 * t
