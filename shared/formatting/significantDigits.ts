/**
 * A number with a fixed count of significant digits, as printed in tables and figures: never '-0', never a bare '-',
 * plain decimals from 0.001 to 999999, otherwise a power of ten ('1.23e-5').
 *
 * @param digits @default 4
 */
export function significantDigits(value: number, digits = 4): string {
  if (Number.isNaN(value)) return 'not a number'
  if (!Number.isFinite(value)) return value > 0 ? 'infinite' : 'minus infinite'
  if (value === 0) return '0'
  // Rounding first decides the power: 9.9996 has four digits as 10.00.
  const rounded = Number(value.toPrecision(digits))
  const power = Math.floor(Math.log10(Math.abs(rounded)) + 1e-12)
  if (power < -3 || power > 5) {
    const [mantissa, exponent] = value.toExponential(digits - 1).split('e') as [string, string]
    return `${mantissa}e${Number(exponent)}`
  }
  return rounded.toFixed(Math.max(0, digits - 1 - power))
}
