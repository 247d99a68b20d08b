const decimal = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i

/**
 * The number in a cell, null where the cell holds no plain decimal (text, nothing, thousands separators, a unit) or a number too
 * large for a double.
 */
export function parseDecimal(cell: string, decimalComma: boolean): number | null {
  const trimmed = cell.trim()
  if (decimalComma && trimmed.includes('.')) return null
  const plain = decimalComma ? trimmed.replace(',', '.') : trimmed
  if (!decimal.test(plain)) return null
  const value = Number(plain)
  return Number.isFinite(value) ? value : null
}
