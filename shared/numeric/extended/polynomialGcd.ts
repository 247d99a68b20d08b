import { divideExactly } from './divideExactly'
import { modularGcd } from './modularPolynomial'
import { primitivePart } from './primitivePart'
import { primesBelow } from './primesBelow'

/**
 * Greatest common divisor of two non-zero integer polynomials (lowest power first), primitive, by images modulo primes
 * put together by the Chinese remainder theorem and confirmed by exact division (W. S. Brown, 'On Euclid's algorithm and
 * the computation of polynomial greatest common divisors', Journal of the ACM 18, 1971).
 */
export function polynomialGcd(left: bigint[], right: bigint[]): bigint[] {
  const a = primitivePart(left)
  const b = primitivePart(right)
  const leadA = a[a.length - 1] as bigint
  const leadB = b[b.length - 1] as bigint
  // the leading coefficient of the gcd divides both leads; the smaller one is multiple enough
  const multiple = leadA < leadB ? leadA : leadB
  let degree = Infinity
  let image: bigint[] = []
  let modulus = 1n
  let last = ''
  for (const prime of primesBelow(2 ** 26)) {
    const p = BigInt(prime)
    if (leadA % p === 0n || leadB % p === 0n) continue
    const found = modularGcd(reduce(a, p), reduce(b, p), prime)
    if (found.length === 1) return [1n]
    if (found.length - 1 > degree) continue
    const scaled = found.map(value => (BigInt(value) * multiple) % p)
    if (found.length - 1 < degree) {
      degree = found.length - 1
      image = scaled
      modulus = p
      last = ''
      continue
    }
    image = image.map((value, k) => {
      const difference = (((scaled[k] as bigint) - value) % p + p) % p
      return value + modulus * ((difference * inverseModulo(modulus % p, p)) % p)
    })
    modulus *= p
    const half = modulus / 2n
    const candidate = primitivePart(image.map(value => value > half ? value - modulus : value))
    const key = candidate.join()
    if (key === last && divideExactly(a, candidate) && divideExactly(b, candidate)) return candidate
    last = key
  }
  throw new RangeError('the common factor of the polynomials could not be found')
}

function reduce(coefficients: bigint[], prime: bigint): number[] {
  return coefficients.map((coefficient) => {
    const rest = Number(coefficient % prime)
    return rest < 0 ? rest + Number(prime) : rest
  })
}

function inverseModulo(value: bigint, prime: bigint): bigint {
  let [r0, r1, t0, t1] = [prime, value, 0n, 1n]
  while (r1 !== 0n) {
    const quotient = r0 / r1;
    [r0, r1] = [r1, r0 - quotient * r1];
    [t0, t1] = [t1, t0 - quotient * t1]
  }
  return t0 < 0n ? t0 + prime : t0
}
