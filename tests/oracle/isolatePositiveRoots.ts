import { bitLength } from './dyadic'
import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'
import { PositiveRoot } from './PositiveRoot'

/** 2^exponent beyond every positive root: twice the largest |a_i / a_n|^(1/(n-i)) (M. Fujiwara, Tohoku Math. J. 10, 1916). */
function upperExponent(p: IntegerPolynomial): number {
  const degree = p.length - 1
  const lead = bitLength(p[degree]!)
  let most = Number.NEGATIVE_INFINITY
  for (let i = 0; i < degree; i += 1) {
    if (p[i] !== 0n) most = Math.max(most, Math.ceil((bitLength(p[i]!) - lead + 1) / (degree - i)))
  }
  return most + 2
}

/** p without its factors x + 1: the bilinear map brings them in powers, and they have no positive root. */
function withoutMinusOne(p: IntegerPolynomial): IntegerPolynomial {
  let q = p
  while (q.length > 1 && q.reduce((sum, c, i) => i % 2 === 0 ? sum + c : sum - c, 0n) === 0n) q = integerPolynomial.exactQuotient(q, [1n, 1n])
  return q
}

/** The polynomial in v whose roots in (0, 1) are those of p in (2^from, 2^to). */
function onUnitInterval(p: IntegerPolynomial, from: number, to: number): IntegerPolynomial {
  const degree = p.length - 1
  const scaled = p.map((c, i) => c << BigInt(from >= 0 ? from * i : -from * (degree - i)))
  const moved = integerPolynomial.shiftByOne(scaled)
  if (to - from === 1) return moved
  const width = (1n << BigInt(to - from)) - 1n
  let power = 1n
  return moved.map((c) => {
    const value = c * power
    power *= width
    return value
  })
}

/** Bound of Descartes' rule on the number of roots in (0, 1): exact where it is 0 or 1. */
function variationsOnUnitInterval(q: IntegerPolynomial): number {
  return integerPolynomial.signVariations(integerPolynomial.shiftByOne(q.slice().reverse()))
}

/**
 * All positive roots of an integer polynomial, each in an interval of its own, in ascending order; multiple roots once.
 *
 * Exact: Descartes' rule of signs with bisection (G. E. Collins, A. G. Akritas, Polynomial real root isolation using Descartes' rule of
 * signs, SYMSAC 1976) on the square-free part, in big integers; the axis is first cut at powers of two.
 */
export function isolatePositiveRoots(polynomial: IntegerPolynomial): PositiveRoot[] {
  let p = integerPolynomial.squareFree(withoutMinusOne(integerPolynomial.trimmed(polynomial)))
  while (p.length > 0 && p[0] === 0n) p = p.slice(1)
  if (p.length <= 1 || integerPolynomial.signVariations(p) === 0) return []
  const to = upperExponent(p)
  const from = -upperExponent(p.slice().reverse())
  const roots: PositiveRoot[] = []

  /** Roots in the open interval (low, low + 1) * 2^exponent, q being p on it as a polynomial over (0, 1). */
  const bisect = (q: IntegerPolynomial, low: bigint, exponent: number): void => {
    const variations = variationsOnUnitInterval(q)
    if (variations === 0) return
    if (variations === 1) {
      roots.push(new PositiveRoot(p, low, low + 1n, exponent))
      return
    }
    const degree = q.length - 1
    const left = q.map((c, i) => c << BigInt(degree - i))
    let right = integerPolynomial.shiftByOne(left)
    bisect(left, 2n * low, exponent - 1)
    if (right[0] === 0n) {
      roots.push(new PositiveRoot(p, 2n * low + 1n, 2n * low + 1n, exponent - 1))
      right = right.slice(1)
    }
    bisect(right, 2n * low + 1n, exponent - 1)
  }

  const cutAtPowers = (low: number, high: number): void => {
    const q = onUnitInterval(p, low, high)
    const trimmed = q[0] === 0n ? q.slice(1) : q
    if (high - low === 1) {
      // a root at an end is listed where the axis is cut, and its factor is out of the way here
      bisect(trimmed, 1n, low)
      return
    }
    const variations = variationsOnUnitInterval(trimmed)
    if (variations === 0) return
    const middle = Math.floor((low + high) / 2)
    cutAtPowers(low, middle)
    if (integerPolynomial.signAt(p, 1n, middle) === 0) roots.push(new PositiveRoot(p, 1n, 1n, middle))
    cutAtPowers(middle, high)
  }
  cutAtPowers(from, to)
  return roots
}
