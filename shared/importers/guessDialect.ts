import Papa from 'papaparse'
import type { Dialect } from './Dialect'
import { parseDecimal } from './parseDecimal'

const dialects: readonly Dialect[] = [
  { delimiter: ',', decimalComma: false },
  { delimiter: ';', decimalComma: false },
  { delimiter: '\t', decimalComma: false },
  { delimiter: ';', decimalComma: true },
  { delimiter: '\t', decimalComma: true },
]

/**
 * The dialect in which most lines of the head read as three or more numbers and nothing else; among equals the one with more
 * cells a line. Null where no line reads as numbers in any.
 */
export function guessDialect(lines: readonly string[]): Dialect | null {
  const head = lines.filter(line => line.trim() !== '').slice(0, 200).join('\n')
  let best: Dialect | null = null
  let bestScore = 0
  for (const dialect of dialects) {
    const { data } = Papa.parse<string[]>(head, { delimiter: dialect.delimiter })
    const numeric = data.filter(row => row.length >= 3 && row.every(cell => cell.trim() === '' || parseDecimal(cell, dialect.decimalComma) !== null) && row.some(cell => cell.trim() !== ''))
    const score = numeric.length + numeric.reduce((sum, row) => sum + row.length, 0) / 1e6
    if (score > bestScore) [best, bestScore] = [dialect, score]
  }
  return best
}
