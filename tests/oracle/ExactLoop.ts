import { dyadicOf, shifted } from './dyadic'
import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'

const { add, multiply, scale, raise, subtract } = integerPolynomial

/** The source forms the oracle takes: as in the contract, by its own types. */
export interface OracleRoots {
  zeros: [number, number][]
  poles: [number, number][]
  gain: number
  deadTime?: number
  sampleTime?: number
}

export interface OracleCoefficients {
  numerator: number[]
  denominator: number[]
  deadTime?: number
  sampleTime?: number
}

/** numerator(s) / denominator(s) with integer coefficients; for a sampled loop s is the bilinear variable, z = (1 + s)/(1 - s). */
export interface ExactLoop {
  numerator: IntegerPolynomial
  denominator: IntegerPolynomial
  deadTime: number
  sampleTime?: number
}

interface ScaledPolynomial {
  coefficients: IntegerPolynomial
  /** the polynomial is coefficients * 2^exponent */
  exponent: number
}

function fromDoubles(highestFirst: number[]): ScaledPolynomial {
  const exact = highestFirst.map(dyadicOf).reverse()
  const exponent = Math.min(...exact.filter(d => d.mantissa !== 0n).map(d => d.exponent))
  return {
    coefficients: integerPolynomial.trimmed(exact.map(d => d.mantissa === 0n ? 0n : shifted(d.mantissa, d.exponent - exponent))),
    exponent,
  }
}

/** Real factors (v - r), or v^2 - 2 Re r v + |r|^2 of a conjugate pair, each exact. */
function fromRoots(roots: [number, number][], gain: number): ScaledPolynomial {
  const lead = dyadicOf(gain)
  let product: ScaledPolynomial = { coefficients: [lead.mantissa], exponent: lead.exponent }
  for (const [re, im] of roots) {
    if (im < 0) continue
    const a = dyadicOf(re)
    const b = dyadicOf(im)
    const e = Math.min(a.mantissa === 0n ? 0 : a.exponent, b.mantissa === 0n ? 0 : b.exponent, 0)
    const x = a.mantissa === 0n ? 0n : shifted(a.mantissa, a.exponent - e)
    const y = b.mantissa === 0n ? 0n : shifted(b.mantissa, b.exponent - e)
    const unit = 1n << BigInt(-e)
    const factor = im === 0 ? [-x, unit] : [x * x + y * y, -2n * x * unit, unit * unit]
    product = { coefficients: multiply(product.coefficients, factor), exponent: product.exponent + e * (im === 0 ? 1 : 2) }
  }
  return product
}

/** sum_i p_i (1 + s)^i (1 - s)^(degree - i) */
export function bilinear(p: IntegerPolynomial, degree: number): IntegerPolynomial {
  const powers = (base: IntegerPolynomial) => {
    const list: IntegerPolynomial[] = [[1n]]
    for (let i = 0; i < degree; i += 1) list.push(multiply(list[i]!, base))
    return list
  }
  const plus = powers([1n, 1n])
  const minus = powers([1n, -1n])
  return p.reduce<IntegerPolynomial>((sum, c, i) => add(sum, scale(multiply(plus[i]!, minus[degree - i]!), c)), [])
}

/** The loop exactly as its doubles give it, as a quotient of integer polynomials in s or in the bilinear variable. */
export function exactLoop(input: OracleRoots | OracleCoefficients): ExactLoop {
  const top = 'gain' in input ? fromRoots(input.zeros, input.gain) : fromDoubles(input.numerator)
  const bottom = 'gain' in input ? fromRoots(input.poles, 1) : fromDoubles(input.denominator)
  const exponent = Math.min(top.exponent, bottom.exponent)
  let numerator = scale(top.coefficients, 1n << BigInt(top.exponent - exponent))
  let denominator = scale(bottom.coefficients, 1n << BigInt(bottom.exponent - exponent))
  if (input.sampleTime !== undefined) {
    const degree = Math.max(numerator.length, denominator.length) - 1
    numerator = bilinear(numerator, degree)
    denominator = bilinear(denominator, degree)
  }
  return { numerator, denominator, deadTime: input.deadTime ?? 0, sampleTime: input.sampleTime }
}

/** Even and odd part on the axis: p(jw) = even(x) + jw odd(x) with x = w^2. */
export function onAxis(p: IntegerPolynomial): { even: IntegerPolynomial, odd: IntegerPolynomial } {
  const even: IntegerPolynomial = []
  const odd: IntegerPolynomial = []
  for (let i = 0; i < p.length; i += 1) {
    const signed = i % 4 < 2 ? p[i]! : -p[i]!
    if (i % 2 === 0) even.push(signed)
    else odd.push(signed)
  }
  return { even: integerPolynomial.trimmed(even), odd: integerPolynomial.trimmed(odd) }
}

/** |p(jw)|^2 as a polynomial in x = w^2. */
export function squaredMagnitude(p: IntegerPolynomial): IntegerPolynomial {
  const { even, odd } = onAxis(p)
  return add(multiply(even, even), raise(multiply(odd, odd), 1))
}

/** Real part, and imaginary part divided by w, of p(jw) conj(q(jw)), in x = w^2. */
export function crossProduct(p: IntegerPolynomial, q: IntegerPolynomial): { real: IntegerPolynomial, imaginary: IntegerPolynomial } {
  const a = onAxis(p)
  const b = onAxis(q)
  return {
    real: add(multiply(a.even, b.even), raise(multiply(a.odd, b.odd), 1)),
    imaginary: subtract(multiply(a.odd, b.even), multiply(a.even, b.odd)),
  }
}
