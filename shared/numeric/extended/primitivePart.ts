import { integerGcd } from './integerGcd'

/** The polynomial divided by the greatest common divisor of its coefficients, leading coefficient positive. */
export function primitivePart(coefficients: bigint[]): bigint[] {
  let content = 0n
  for (const coefficient of coefficients) {
    content = integerGcd(content, coefficient)
    if (content === 1n) break
  }
  if ((coefficients[coefficients.length - 1] as bigint) < 0n) content = -content
  return content === 1n ? coefficients : coefficients.map(coefficient => coefficient / content)
}
