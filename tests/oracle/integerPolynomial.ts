/** A polynomial with big integer coefficients, lowest power first; the zero polynomial is empty. */
export type IntegerPolynomial = bigint[]

function trimmed(p: IntegerPolynomial): IntegerPolynomial {
  let length = p.length
  while (length > 0 && p[length - 1] === 0n) length -= 1
  return length === p.length ? p : p.slice(0, length)
}

function add(p: IntegerPolynomial, q: IntegerPolynomial): IntegerPolynomial {
  const length = Math.max(p.length, q.length)
  return trimmed(Array.from({ length }, (_, i) => (p[i] ?? 0n) + (q[i] ?? 0n)))
}

function scale(p: IntegerPolynomial, factor: bigint): IntegerPolynomial {
  return factor === 0n ? [] : p.map(c => c * factor)
}

function subtract(p: IntegerPolynomial, q: IntegerPolynomial): IntegerPolynomial {
  return add(p, scale(q, -1n))
}

function multiply(p: IntegerPolynomial, q: IntegerPolynomial): IntegerPolynomial {
  if (p.length === 0 || q.length === 0) return []
  const product = new Array<bigint>(p.length + q.length - 1).fill(0n)
  for (let i = 0; i < p.length; i += 1) {
    if (p[i] === 0n) continue
    for (let j = 0; j < q.length; j += 1) product[i + j]! += p[i]! * q[j]!
  }
  return product
}

/** p times the variable to the given power. */
function raise(p: IntegerPolynomial, power: number): IntegerPolynomial {
  return p.length === 0 ? [] : [...new Array<bigint>(power).fill(0n), ...p]
}

function derivative(p: IntegerPolynomial): IntegerPolynomial {
  return p.slice(1).map((c, i) => c * BigInt(i + 1))
}

/** p(x + 1) */
function shiftByOne(p: IntegerPolynomial): IntegerPolynomial {
  const q = p.slice()
  for (let i = q.length - 2; i >= 0; i -= 1) {
    for (let j = i; j < q.length - 1; j += 1) q[j]! += q[j + 1]!
  }
  return q
}

/** Number of sign changes in the row of coefficients (zeros left out). */
function signVariations(p: IntegerPolynomial): number {
  let variations = 0
  let last = 0
  for (const c of p) {
    if (c === 0n) continue
    const sign = c > 0n ? 1 : -1
    if (last !== 0 && sign !== last) variations += 1
    last = sign
  }
  return variations
}

/** p(numerator * 2^exponent) times 2^(-exponent * degree) for a negative exponent: an integer of the same sign. */
function valueAt(p: IntegerPolynomial, numerator: bigint, exponent: number): bigint {
  let value = 0n
  if (exponent >= 0) {
    const x = numerator << BigInt(exponent)
    for (let i = p.length - 1; i >= 0; i -= 1) value = value * x + p[i]!
    return value
  }
  const step = BigInt(-exponent)
  let power = 0n
  for (let i = p.length - 1; i >= 0; i -= 1) {
    value = value * numerator + (p[i]! << power)
    power += step
  }
  return value
}

function signAt(p: IntegerPolynomial, numerator: bigint, exponent: number): -1 | 0 | 1 {
  const value = valueAt(p, numerator, exponent)
  return value > 0n ? 1 : value < 0n ? -1 : 0
}

function gcdOfIntegers(a: bigint, b: bigint): bigint {
  let x = a < 0n ? -a : a
  let y = b < 0n ? -b : b
  while (y !== 0n) [x, y] = [y, x % y]
  return x
}

/** p divided by the greatest common divisor of its coefficients. */
function primitivePart(p: IntegerPolynomial): IntegerPolynomial {
  let content = 0n
  for (const c of p) {
    content = gcdOfIntegers(content, c)
    if (content === 1n) return p
  }
  return content === 0n ? [] : p.map(c => c / content)
}

/** Remainder of c * p by q, c a positive integer. */
function positivePseudoRemainder(p: IntegerPolynomial, q: IntegerPolynomial): IntegerPolynomial {
  let remainder = trimmed(p)
  const lead = q[q.length - 1]!
  const size = lead < 0n ? -lead : lead
  while (remainder.length >= q.length) {
    const head = remainder[remainder.length - 1]!
    const factor = lead < 0n ? -head : head
    const offset = remainder.length - q.length
    const next = remainder.slice(0, -1).map(c => c * size)
    for (let i = 0; i < q.length - 1; i += 1) next[i + offset]! -= factor * q[i]!
    remainder = trimmed(next)
  }
  return remainder
}

/** Greatest common divisor over the rationals, primitive, by the primitive remainder sequence. */
function gcd(p: IntegerPolynomial, q: IntegerPolynomial): IntegerPolynomial {
  if (p.length > 0 && q.length > 0 && provenCoprime(trimmed(p), trimmed(q))) return [1n]
  let a = primitivePart(trimmed(p))
  let b = primitivePart(trimmed(q))
  if (a.length < b.length) [a, b] = [b, a]
  while (b.length > 0) [a, b] = [b, primitivePart(positivePseudoRemainder(a, b))]
  return a
}

/** p / q times an integer, where q divides p over the rationals. @throws RangeError where it does not */
function exactQuotient(p: IntegerPolynomial, q: IntegerPolynomial): IntegerPolynomial {
  let remainder = trimmed(p)
  const lead = q[q.length - 1]!
  let quotient = new Array<bigint>(Math.max(0, remainder.length - q.length + 1)).fill(0n)
  while (remainder.length >= q.length) {
    const offset = remainder.length - q.length
    if (remainder[remainder.length - 1]! % lead !== 0n) {
      const size = lead < 0n ? -lead : lead
      remainder = scale(remainder, size)
      quotient = scale(quotient, size)
    }
    const factor = remainder[remainder.length - 1]! / lead
    quotient[offset] = factor
    remainder = trimmed(remainder.slice(0, -1).map((c, i) => i < offset ? c : c - factor * q[i - offset]!))
  }
  if (remainder.length > 0) throw new RangeError('the division leaves a remainder')
  return trimmed(quotient)
}

/** A prime for which coprimality modulo it proves coprimality over the rationals. */
const PRIME = 2305843009213693951n

function powerModPrime(base: bigint, exponent: bigint): bigint {
  let result = 1n
  let factor = base % PRIME
  for (let e = exponent; e > 0n; e >>= 1n) {
    if (e & 1n) result = result * factor % PRIME
    factor = factor * factor % PRIME
  }
  return result
}

/** True where p and q are shown to have no common root by their gcd modulo a prime; false means nothing. */
function provenCoprime(p: IntegerPolynomial, q: IntegerPolynomial): boolean {
  const reduce = (r: IntegerPolynomial) => r.map(c => ((c % PRIME) + PRIME) % PRIME)
  let a = reduce(p)
  let b = reduce(q)
  if (a[a.length - 1] === 0n || b[b.length - 1] === 0n) return false
  while (b.length > 0) {
    const inverse = powerModPrime(b[b.length - 1]!, PRIME - 2n)
    let remainder = a
    while (remainder.length >= b.length) {
      const factor = remainder[remainder.length - 1]! * inverse % PRIME
      const offset = remainder.length - b.length
      remainder = trimmed(remainder.slice(0, -1).map((c, i) => i < offset ? c : (c + (PRIME - factor) * b[i - offset]!) % PRIME))
    }
    a = b
    b = remainder
  }
  return a.length === 1
}

/** Same roots, each simple, same sign of the leading coefficient. */
function squareFree(p: IntegerPolynomial): IntegerPolynomial {
  const q = trimmed(p)
  if (q.length <= 2) return q
  const slope = derivative(q)
  if (provenCoprime(q, slope)) return q
  const common = gcd(q, slope)
  if (common.length <= 1) return q
  const quotient = primitivePart(exactQuotient(primitivePart(q), common))
  const sameSign = (quotient[quotient.length - 1]! > 0n) === (q[q.length - 1]! > 0n)
  return sameSign ? quotient : scale(quotient, -1n)
}

/** Arithmetic of polynomials with big integer coefficients: every operation exact. */
export const integerPolynomial = {
  trimmed, add, subtract, scale, multiply, raise, derivative, shiftByOne, signVariations, valueAt, signAt,
  gcd, exactQuotient, primitivePart, positivePseudoRemainder, squareFree,
}
