import { realInverse } from '../../numeric/linear/realInverse'

/** Units of 2^-53 by which the numbers of the matrices may be off: as for rounded coefficients (factors/BoundaryRule.ts). */
const UNITS = 4 * 2 ** -53
/** Rounding of the reduction and of the values of its polynomials, in parts of the norm of A for each state. */
export const REDUCTION_ROUNDING = 60 * 2 ** -104

/** Matrices of one channel and how large the numbers about each entry are: what its rounding is measured by. */
export interface ChannelMatrices {
  a: Float64Array
  b: Float64Array
  c: Float64Array
  d: number
  /** For each entry of A the smaller of the largest magnitudes in its row and in its column: small and large parts that do not meet are not mixed. */
  sizes: Float64Array
  /** of A */
  norm: number
}

/** How far the response at one point may move when the numbers of the matrices move by a few units in the last place, to first order. */
export interface Perturbation {
  /** of C (sI - A)^-1 B + D of one channel, absolute */
  response: number
  /** of det(sI - A), relative */
  determinant: number
}

/**
 * First-order bounds at a real point s where each number of A is off by 4 units in the last place of the larger numbers about it (`sizes`), each of b and c by those of its largest, d by its own: as
 * rounding after a change of coordinates leaves them. Both infinite where s is an eigenvalue to the last bit.
 */
export function perturbationAt(channel: ChannelMatrices, s: number): Perturbation {
  const { a, b, c, sizes, norm } = channel
  const n = b.length
  const inverse = realInverse(a, n, s)
  if (!inverse) return { response: Infinity, determinant: Infinity }
  const x = new Float64Array(n)
  const y = new Float64Array(n)
  let trace = 0
  let square = 0
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const value = inverse[i * n + j]!
      x[i]! += value * b[j]!
      y[j]! += c[i]! * value
      trace += Math.abs(value) * sizes[j * n + i]!
      square += value * value
    }
  }
  return { response: responseUncertainty(channel, absolute(x), absolute(y)), determinant: UNITS * trace + REDUCTION_ROUNDING * n * norm * Math.sqrt(n * square) }
}

/** The bound of the response from the magnitudes of x = (sI - A)^-1 b and of y, y' = c' (sI - A)^-1. */
export function responseUncertainty({ b, c, d, sizes, norm }: ChannelMatrices, x: Float64Array, y: Float64Array): number {
  const n = x.length
  const ofB = largest(b)
  const ofC = largest(c)
  let sum = Math.abs(d)
  let xx = 0
  let yy = 0
  for (let i = 0; i < n; i++) {
    let row = ofB
    for (let j = 0; j < n; j++) row += sizes[i * n + j]! * x[j]!
    sum += y[i]! * row + ofC * x[i]!
    xx += x[i]! ** 2
    yy += y[i]! ** 2
  }
  return UNITS * sum + REDUCTION_ROUNDING * n * norm * Math.sqrt(xx * yy)
}

function largest(values: Float64Array): number {
  return values.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
}

function absolute(values: Float64Array): Float64Array {
  return values.map(value => Math.abs(value))
}
