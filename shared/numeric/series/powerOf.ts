/** base^exponent for a whole exponent from 0, by repeated squaring. */
export function powerOf(base: number, exponent: number): number {
  let result = 1
  let square = base
  for (let rest = exponent; rest > 0; rest >>= 1) {
    if (rest & 1) result *= square
    square *= square
  }
  return result
}
