import type { ControllerHessenberg } from '../../numeric/doubleDouble/controllerHessenberg'
import { HymanEvaluation } from '../../numeric/doubleDouble/HymanEvaluation'
import { refineDoubleDoubleRoots } from '../../numeric/doubleDouble/refineDoubleDoubleRoots'
import { hessenbergEigenvalues } from '../../numeric/linear/hessenbergEigenvalues'
import { rootList, type PreciseRoot } from './rootList'

/** Eigenvalues of a diagonal block with nothing zero below its diagonal, to double-double precision. @throws RangeError when they do not settle */
export function blockRoots(form: ControllerHessenberg, from: number, to: number): PreciseRoot[] {
  const { h } = form
  if (to - from === 1) {
    const place = from * h.columns + from
    return [{ re: h.high[place]!, reLow: h.low[place]!, im: 0, imLow: 0, correction: 0 }]
  }
  const start = blockEigenvalues(form, from, to)
  const evaluation = new HymanEvaluation(form, from, to)
  return rootList(refineDoubleDoubleRoots((re, reLow, im, imLow, out) => evaluation.denominator(re, reLow, im, imLow, out), inverseProduct(form, from, from + 1, to), blockNorm(form, from, to), start))
}

/** Largest sum of magnitudes in a row of the block. */
export function blockNorm({ h }: ControllerHessenberg, from: number, to: number): number {
  let most = 0
  for (let i = from; i < to; i++) {
    let sum = 0
    for (let j = Math.max(from, i - 1); j < to; j++) sum += Math.abs(h.high[i * h.columns + j]!)
    most = Math.max(most, sum)
  }
  return most
}

/** Eigenvalues of such a block in doubles. @throws RangeError when they do not settle */
export function blockEigenvalues({ h }: ControllerHessenberg, from: number, to: number): { re: Float64Array, im: Float64Array } {
  const part = h.part(from, to, from, to)
  const found = hessenbergEigenvalues(part.high, to - from)
  if (!found) throw new RangeError('the eigenvalues do not settle')
  return found
}

/** 1 / product of the entries h_i(i-1) below the diagonal, `first` <= i < `to`, within a block from `from`, as mantissa * 2^exponent. */
export function inverseProduct({ h }: ControllerHessenberg, from: number, first: number, to: number): { mantissa: number, exponent: number } {
  let mantissa = 1
  let exponent = 0
  for (let i = Math.max(first, from + 1); i < to; i++) {
    mantissa /= h.high[i * h.columns + i - 1]!
    const power = Math.round(Math.log2(Math.abs(mantissa)))
    mantissa *= 2 ** -power
    exponent += power
  }
  return { mantissa, exponent }
}
