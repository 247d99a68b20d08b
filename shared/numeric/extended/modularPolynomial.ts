/** Polynomials over the integers modulo a prime below 2^26 (products stay below 2^52), lowest power first, no leading zeros. */

/** gcd of two polynomials modulo `prime`, made monic; an empty array is the zero polynomial. */
export function modularGcd(left: number[], right: number[], prime: number): number[] {
  let a = trim(left.slice())
  let b = trim(right.slice())
  while (b.length > 0) {
    const inverse = modularInverse(b[b.length - 1] as number, prime)
    while (a.length >= b.length) {
      const factor = ((a[a.length - 1] as number) * inverse) % prime
      const offset = a.length - b.length
      for (let i = 0; i < b.length; i++) {
        a[i + offset] = ((a[i + offset] as number) + prime * factor - factor * (b[i] as number)) % prime
      }
      trim(a)
    }
    const rest = a
    a = b
    b = rest
  }
  if (a.length === 0) return a
  const inverse = modularInverse(a[a.length - 1] as number, prime)
  return a.map(value => (value * inverse) % prime)
}

function trim(values: number[]): number[] {
  while (values.length > 0 && values[values.length - 1] === 0) values.pop()
  return values
}

function modularInverse(value: number, prime: number): number {
  let [r0, r1, t0, t1] = [prime, value, 0, 1]
  while (r1 !== 0) {
    const quotient = Math.floor(r0 / r1);
    [r0, r1] = [r1, r0 - quotient * r1];
    [t0, t1] = [t1, t0 - quotient * t1]
  }
  return t0 < 0 ? t0 + prime : t0
}
