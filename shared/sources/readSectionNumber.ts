import { parseDecimal } from '../importers/parseDecimal'

/**
 * The number a cell of a second-order section stands for: a decimal, or a fraction of two as in 16384/32768; null where it is neither.
 * A minus sign pasted from a document is taken for one.
 */
export function readSectionNumber(text: string): number | null {
  const parts = text.split('/')
  if (parts.length > 2) return null
  const [numerator, denominator] = parts.map(part => parseDecimal(part.trim().replace(/^[\u2212\u2013]/, '-'), false))
  if (numerator === null || numerator === undefined || denominator === null) return null
  if (denominator === undefined) return numerator
  const value = numerator / denominator
  return Number.isFinite(value) ? value : null
}
