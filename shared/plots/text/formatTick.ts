/** A round number of an axis as it stands, with the minus sign of print: 0.05, 20, −180; from 1e5 and under 1e-3 as 1e5. */
export function formatTick(value: number): string {
  const rounded = Number(value.toPrecision(6)) + 0
  const magnitude = Math.abs(rounded)
  const text = magnitude !== 0 && (magnitude >= 1e5 || magnitude < 1e-3) ? rounded.toExponential().replace('e+', 'e') : String(rounded)
  return text.replace(/-/g, '−')
}
