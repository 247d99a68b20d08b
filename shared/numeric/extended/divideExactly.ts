/** Quotient of two integer polynomials (lowest power first) where the division leaves no rest; null where it does. */
export function divideExactly(dividend: bigint[], divisor: bigint[]): bigint[] | null {
  const rest = dividend.slice()
  const lead = divisor[divisor.length - 1] as bigint
  const degree = dividend.length - divisor.length
  if (degree < 0) return null
  const quotient = new Array<bigint>(degree + 1).fill(0n)
  for (let k = degree; k >= 0; k--) {
    const top = rest[k + divisor.length - 1] as bigint
    if (top === 0n) continue
    if (top % lead !== 0n) return null
    const factor = top / lead
    quotient[k] = factor
    for (let i = 0; i < divisor.length; i++) rest[k + i] = (rest[k + i] as bigint) - factor * (divisor[i] as bigint)
  }
  return rest.every(value => value === 0n) ? quotient : null
}
