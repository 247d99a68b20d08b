const BITS = 1200n

/**
 * Distance (re, im) from a given point to the root of a polynomial (doubles, highest power first) beside it, by Newton's
 * iteration in 1200-bit fixed point: a second way to the truth, written for the tests.
 */
export function newtonTruth(coefficients: number[], re: number, im: number): { re: number, im: number } {
  const c = coefficients.map(fixed)
  let [x, y] = [fixed(re), fixed(im)]
  for (let step = 0; step < 12; step++) {
    let [p, q, d, e] = [0n, 0n, 0n, 0n]
    for (const value of c) {
      [d, e] = [((d * x - e * y) >> BITS) + p, ((d * y + e * x) >> BITS) + q];
      [p, q] = [((p * x - q * y) >> BITS) + value, (p * y + q * x) >> BITS]
    }
    const square = (d * d + e * e) >> BITS
    if (square === 0n) break
    x -= ((p * d + q * e) / square)
    y -= ((q * d - p * e) / square)
  }
  return { re: Number((x - fixed(re)) >> 400n) / 2 ** 800, im: Number((y - fixed(im)) >> 400n) / 2 ** 800 }
}

/** A double as a 1200-bit fixed-point integer, exact down to 2^-1200. */
function fixed(value: number): bigint {
  let exponent = 0
  let mantissa = value
  while (mantissa !== 0 && !Number.isInteger(mantissa)) {
    mantissa *= 2
    exponent++
  }
  return (BigInt(mantissa) << BITS) >> BigInt(exponent)
}
