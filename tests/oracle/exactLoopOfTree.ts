import { dyadicOf } from './dyadic'
import { bilinear, type ExactLoop } from './ExactLoop'
import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'
import type { LoopTree } from './LoopTree'

const { add, multiply, subtract, scale, gcd, exactQuotient } = integerPolynomial

interface Fraction { top: IntegerPolynomial, bottom: IntegerPolynomial }

function fractionOf(tree: LoopTree): Fraction {
  switch (tree.kind) {
    case 's': return { top: [0n, 1n], bottom: [1n] }
    case 'delay': throw new RangeError('a dead time is not rational')
    case 'constant': {
      const { mantissa, exponent } = dyadicOf(tree.value)
      return exponent >= 0 ? { top: [mantissa << BigInt(exponent)], bottom: [1n] } : { top: [mantissa], bottom: [1n << BigInt(-exponent)] }
    }
  }
  const a = fractionOf(tree.left)
  const b = fractionOf(tree.right)
  switch (tree.kind) {
    case 'product': return { top: multiply(a.top, b.top), bottom: multiply(a.bottom, b.bottom) }
    case 'quotient': return { top: multiply(a.top, b.bottom), bottom: multiply(a.bottom, b.top) }
    case 'sum': return { top: add(multiply(a.top, b.bottom), multiply(b.top, a.bottom)), bottom: multiply(a.bottom, b.bottom) }
    case 'difference': return { top: subtract(multiply(a.top, b.bottom), multiply(b.top, a.bottom)), bottom: multiply(a.bottom, b.bottom) }
  }
}

/** A rational tree multiplied out exactly and reduced; in s, or in z with a sample time. */
export function exactLoopOfTree(tree: LoopTree, sampleTime?: number): ExactLoop {
  let { top, bottom } = fractionOf(tree)
  const common = gcd(top, bottom)
  if (common.length > 1) {
    // scaled alike first, so that the quotient of the two stays what it is
    const lead = common[common.length - 1]!
    const factor = (lead < 0n ? -lead : lead) ** BigInt(Math.max(top.length, bottom.length))
    const divide = (p: IntegerPolynomial) => {
      const scaled = scale(p, factor)
      const quotient = exactQuotient(scaled, common)
      const want = scaled[scaled.length - 1]! / lead
      return quotient.map(c => c * want / quotient[quotient.length - 1]!)
    }
    ;[top, bottom] = [divide(top), divide(bottom)]
  }
  if (sampleTime === undefined) return { numerator: top, denominator: bottom, deadTime: 0 }
  const degree = Math.max(top.length, bottom.length) - 1
  return { numerator: bilinear(top, degree), denominator: bilinear(bottom, degree), deadTime: 0, sampleTime }
}
