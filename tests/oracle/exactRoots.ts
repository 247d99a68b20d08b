import { bitLength, dyadicToNumber, shifted } from './dyadic'
import { exactLoop, type OracleCoefficients } from './ExactLoop'
import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'

const { derivative, exactQuotient, gcd, primitivePart } = integerPolynomial

interface BigComplex {
  re: bigint
  im: bigint
}

/** Fraction bits of the fixed-point arithmetic: more than the range of the roots and the closeness of clusters cost. */
const BITS = 900

const times = (a: BigComplex, b: BigComplex): BigComplex => ({ re: (a.re * b.re - a.im * b.im) >> BigInt(BITS), im: (a.re * b.im + a.im * b.re) >> BigInt(BITS) })
const minus = (a: BigComplex, b: BigComplex): BigComplex => ({ re: a.re - b.re, im: a.im - b.im })

function over(a: BigComplex, b: BigComplex): BigComplex {
  const size = b.re * b.re + b.im * b.im
  if (size === 0n) throw new RangeError('two iterates met')
  const shift = BigInt(BITS)
  return { re: ((a.re * b.re + a.im * b.im) << shift) / size, im: ((a.im * b.re - a.re * b.im) << shift) / size }
}

/** Roots of a square-free polynomial by the iteration of O. Aberth (Math. Comp. 27, 1973) in fixed point, conjugate pairs made exact. */
function simpleRoots(p: IntegerPolynomial): [number, number][] {
  const degree = p.length - 1
  // variable scaled by a power of two so that the roots are near 1 in the mean, and the polynomial made monic
  const scale = Math.round((bitLength(p[0]!) - bitLength(p[degree]!)) / degree)
  const monic = p.map((c, i) => (shifted(c, BITS + scale * i - Math.min(0, scale * degree)) / shifted(p[degree]!, scale * degree - Math.min(0, scale * degree))))
  const slope = derivative(monic)
  const unit = 1n << BigInt(BITS)
  const evaluate = (q: IntegerPolynomial, at: BigComplex) => {
    let value: BigComplex = { re: 0n, im: 0n }
    for (let i = q.length - 1; i >= 0; i -= 1) {
      value = times(value, at)
      value.re += q[i]!
    }
    return value
  }
  // start points at the radii of the Newton polygon (D. A. Bini, Numer. Algorithms 13, 1996)
  const heights = monic.map((c, i) => ({ i, h: c === 0n ? Number.NEGATIVE_INFINITY : bitLength(c) }))
  const hull: { i: number, h: number }[] = []
  for (const point of heights) {
    if (point.h === Number.NEGATIVE_INFINITY) continue
    while (hull.length >= 2) {
      const [a, b] = hull.slice(-2) as [typeof point, typeof point]
      if ((b.h - a.h) * (point.i - a.i) > (point.h - a.h) * (b.i - a.i)) break
      hull.pop()
    }
    hull.push(point)
  }
  const iterates: BigComplex[] = []
  for (let k = 1; k < hull.length; k += 1) {
    const [a, b] = [hull[k - 1]!, hull[k]!]
    const radius = 2 ** ((a.h - b.h) / (b.i - a.i))
    for (let j = a.i; j < b.i; j += 1) {
      const angle = 2 * Math.PI * (j - a.i) / (b.i - a.i) + 0.7 + k
      const at = (x: number) => shifted(BigInt(Math.round(x * 2 ** 50)), BITS - 50 + Math.round(Math.log2(radius)))
      iterates.push({ re: at(Math.cos(angle)), im: at(Math.sin(angle)) })
    }
  }
  for (let sweep = 0; ; sweep += 1) {
    if (sweep > 2000) throw new RangeError('the iteration did not settle')
    let settled = true
    for (let k = 0; k < degree; k += 1) {
      const at = iterates[k]!
      const newton = over(evaluate(monic, at), evaluate(slope, at))
      let sum: BigComplex = { re: 0n, im: 0n }
      iterates.forEach((other, j) => {
        if (j === k) return
        const term = over({ re: unit, im: 0n }, minus(at, other))
        sum = { re: sum.re + term.re, im: sum.im + term.im }
      })
      const product = times(newton, sum)
      const step = over(newton, { re: unit - product.re, im: -product.im })
      iterates[k] = minus(at, step)
      const size = Math.max(bitLength(at.re), bitLength(at.im))
      if (Math.max(bitLength(step.re), bitLength(step.im)) > size - 200) settled = false
    }
    if (settled) break
  }
  const down = (x: bigint) => dyadicToNumber(x, scale - BITS)
  const real = iterates.filter(z => bitLength(z.im) < bitLength(z.re) - 150)
  const upper = iterates.filter(z => bitLength(z.im) >= bitLength(z.re) - 150 && z.im > 0n)
  if (real.length + 2 * upper.length !== degree) throw new RangeError('the roots do not pair')
  return [...real.map((z): [number, number] => [down(z.re), 0]), ...upper.flatMap((z): [number, number][] => [[down(z.re), down(z.im)], [down(z.re), -down(z.im)]])]
}

/** All roots, each rounded to doubles, multiple ones as often as they count (by D. Y. Y. Yun's square-free decomposition, SYMSAC 1976). */
export function exactRoots(polynomial: IntegerPolynomial): [number, number][] {
  let p = primitivePart(integerPolynomial.trimmed(polynomial))
  const list: [number, number][] = []
  while (p.length > 1 && p[0] === 0n) {
    list.push([0, 0])
    p = p.slice(1)
  }
  while (p.length > 1) {
    const common = gcd(p, derivative(p))
    list.push(...simpleRoots(common.length > 1 ? primitivePart(exactQuotient(p, common)) : p))
    p = common
  }
  return list
}

/** The coefficient form turned to zeros, poles and gain, correctly rounded. */
export function zerosPolesOf(input: OracleCoefficients): { zeros: [number, number][], poles: [number, number][], gain: number } {
  const { numerator, denominator } = exactLoop({ numerator: input.numerator, denominator: input.denominator })
  const lead = (list: number[]) => list.find(c => c !== 0)!
  return { zeros: exactRoots(numerator), poles: exactRoots(denominator), gain: lead(input.numerator) / lead(input.denominator) }
}
