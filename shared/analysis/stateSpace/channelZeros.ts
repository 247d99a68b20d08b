import type { ControllerHessenberg } from '../../numeric/doubleDouble/controllerHessenberg'
import { DoubleDoubleMatrix } from '../../numeric/doubleDouble/DoubleDoubleMatrix'
import { HymanEvaluation } from '../../numeric/doubleDouble/HymanEvaluation'
import { refineDoubleDoubleRoots } from '../../numeric/doubleDouble/refineDoubleDoubleRoots'
import { hessenbergEigenvalues } from '../../numeric/linear/hessenbergEigenvalues'
import { blockNorm, inverseProduct } from './blockRoots'
import { rootList, type PreciseRoot } from './rootList'

/** The numerator of one channel over the reachable part of its input. */
export interface ChannelNumerator {
  zeros: PreciseRoot[]
  /** Leading coefficient of the numerator over the monic denominator, a double-double. */
  gain: { high: number, low: number }
  /** Poles less zeros. */
  excess: number
}

/**
 * Zeros and gain of C (sI - A)^-1 b + d over the reachable part (rows 0 to before `size`) of a controller-Hessenberg form; null where it is zero.
 * `weights` is the row of C Q, of which leading zeros are zeros at infinity: with x_1 to x_(r-1) out of the output the zeros are the eigenvalues of what is left of H when the
 * output is held at zero, again a Hessenberg matrix (starting points, in doubles), refined on the numerator itself in double-double.
 *
 * @throws RangeError when they do not settle
 */
export function channelZeros(form: ControllerHessenberg, size: number, weightsHigh: Float64Array, weightsLow: Float64Array, direct: number): ChannelNumerator | null {
  const { h, beta } = form
  let first = 0
  while (first < size && weightsHigh[first] === 0) first++
  if (direct === 0 && first === size) return null
  const excess = direct === 0 ? first + 1 : 0
  const count = size - excess
  const cell = (high: number, low: number) => {
    const matrix = new DoubleDoubleMatrix(1, 1)
    matrix.high[0] = high
    matrix.low[0] = low
    return matrix
  }
  let gain = direct === 0 ? cell(weightsHigh[first]!, weightsLow[first]!).scale(beta.high, beta.low) : cell(direct, 0)
  for (let i = 1; direct === 0 && i <= first; i++) gain = gain.scale(h.high[i * h.columns + i - 1]!, h.low[i * h.columns + i - 1]!)
  const result = { gain: { high: gain.high[0]!, low: gain.low[0]! }, excess }
  if (count === 0) return { zeros: [], ...result }

  const rest = h.part(excess, size, excess, size).high
  const above = direct === 0 ? h.high[excess * h.columns + excess - 1]! / weightsHigh[first]! : beta.high / direct
  for (let j = 0; j < count; j++) rest[j]! -= above * weightsHigh[excess + j]!
  const start = hessenbergEigenvalues(rest, count)
  if (!start) throw new RangeError('the zeros do not settle')
  const evaluation = new HymanEvaluation(form, 0, size)
  const through = direct === 0 ? { high: 0, low: 0 } : quotient(direct, beta)
  const denominator = new Float64Array(3)
  const lead = inverseProduct(form, 0, excess, size)
  // N / beta = C x + (d / beta) f
  lead.mantissa *= direct === 0 ? weightsHigh[first]! : through.high
  if (direct !== 0) {
    const whole = inverseProduct(form, 0, 1, size)
    lead.mantissa = whole.mantissa * through.high
    lead.exponent = whole.exponent
  }
  const roots = refineDoubleDoubleRoots((re, reLow, im, imLow, out) => {
    evaluation.denominator(re, reLow, im, imLow, denominator)
    evaluation.numerator(weightsHigh, weightsLow, through.high, through.low, out)
  }, lead, blockNorm(form, 0, size), start)
  return { zeros: rootList(roots), ...result }
}

/** d / beta as a double-double. */
function quotient(d: number, beta: { high: number, low: number }): { high: number, low: number } {
  const high = d / beta.high
  const matrix = new DoubleDoubleMatrix(1, 1)
  matrix.high[0] = beta.high
  matrix.low[0] = beta.low
  const rest = DoubleDoubleMatrix.fromNumbers([[d]]).subtract(matrix.scale(high)).high[0]!
  return { high, low: rest / beta.high }
}
