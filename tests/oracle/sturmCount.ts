import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'

const { derivative, positivePseudoRemainder, primitivePart, scale, multiply, trimmed } = integerPolynomial

function variationsAt(chain: IntegerPolynomial[], end: 'zero' | 'infinity'): number {
  return integerPolynomial.signVariations(chain.map(p => end === 'zero' ? p[0]! : p[p.length - 1]!))
}

/**
 * Tarski query over the positive axis: number of roots of p in (0, infinity) with q > 0 minus the number with q < 0, by the signed remainder
 * sequence of p and p'q (S. Basu, R. Pollack, M.-F. Roy, Algorithms in Real Algebraic Geometry, theorem 2.73). With q = 1 it is Sturm's count.
 * p(0) must not be zero. Exact; its cost grows fast with the degree: for cross-checks.
 */
export function sturmCount(p: IntegerPolynomial, q: IntegerPolynomial = [1n]): number {
  const chain = [trimmed(p), trimmed(multiply(derivative(p), q))]
  if (chain[0]![0] === 0n) throw new RangeError('the chain needs p(0) different from zero')
  while (chain[chain.length - 1]!.length > 0) {
    const remainder = positivePseudoRemainder(chain[chain.length - 2]!, chain[chain.length - 1]!)
    chain.push(primitivePart(scale(remainder, -1n)))
  }
  chain.pop()
  return variationsAt(chain, 'zero') - variationsAt(chain, 'infinity')
}
