/** The minus sign of print in place of the hyphen. */
const withMinus = (text: string) => text.replace(/-/g, '−')

/** A number to `digits` significant digits, without trailing zeros lost: 0.50, 12.3, 123. Powers of ten as 1.23e5. */
export function formatSignificant(value: number, digits: number): string {
  if (value === 0) return '0'
  const magnitude = Math.abs(value)
  if (magnitude >= 1e5 || magnitude < 1e-3) {
    const [mantissa, exponent] = value.toExponential(digits - 1).split('e') as [string, string]
    return withMinus(`${mantissa}e${Number(exponent)}`)
  }
  const rounded = Number(value.toPrecision(digits))
  const places = Math.max(0, digits - 1 - Math.floor(Math.log10(Math.abs(rounded))))
  return withMinus(rounded.toFixed(places))
}

/** A number to `places` decimals; one that rounds to zero has no sign. */
export function formatFixed(value: number, places: number): string {
  return withMinus((Number(value.toFixed(places)) + 0).toFixed(places))
}

/** A round number of an axis as it stands: 0.05, 20, 2000; from 1e5 and under 1e-3 as 1e5. */
export function formatTick(value: number): string {
  const magnitude = Math.abs(value)
  if (magnitude !== 0 && (magnitude >= 1e5 || magnitude < 1e-3)) {
    const [mantissa, exponent] = Number(value.toPrecision(6)).toExponential().split('e') as [string, string]
    return withMinus(`${mantissa}e${Number(exponent)}`)
  }
  return withMinus(String(Number(value.toPrecision(6))))
}
