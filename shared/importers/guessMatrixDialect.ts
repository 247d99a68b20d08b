import Papa from 'papaparse'
import type { Dialect } from './Dialect'
import { parseDecimal } from './parseDecimal'

export interface MatrixDialect {
  dialect: Dialect
  /** whether runs of blanks separate the cells: they are to be turned into the dialect's tabulator */
  blanks: boolean
}

const dialects: readonly MatrixDialect[] = [
  { dialect: { delimiter: ',', decimalComma: false }, blanks: false },
  { dialect: { delimiter: ';', decimalComma: false }, blanks: false },
  { dialect: { delimiter: '\t', decimalComma: false }, blanks: false },
  { dialect: { delimiter: ';', decimalComma: true }, blanks: false },
  { dialect: { delimiter: '\t', decimalComma: true }, blanks: false },
  { dialect: { delimiter: '\t', decimalComma: false }, blanks: true },
  { dialect: { delimiter: '\t', decimalComma: true }, blanks: true },
]

/** The dialect in which most of the first lines read as numbers and nothing else; among equals the one with more cells a line, then the first. */
export function guessMatrixDialect(lines: readonly string[]): MatrixDialect {
  const head = lines.filter(line => line.trim() !== '').slice(0, 400)
  let best = dialects[0]!
  let bestScore = 0
  for (const candidate of dialects) {
    const { dialect, blanks } = candidate
    const text = (blanks ? head.map(line => line.trim().replace(/[ \t]+/g, '\t')) : head).join('\n')
    const { data } = Papa.parse<string[]>(text, { delimiter: dialect.delimiter })
    const numeric = data.map(row => row.filter(cell => cell.trim() !== '')).filter(cells => cells.length > 0 && cells.every(cell => parseDecimal(cell, dialect.decimalComma) !== null))
    const score = numeric.length + numeric.reduce((sum, cells) => sum + cells.length, 0) / 1e6
    if (score > bestScore) [best, bestScore] = [candidate, score]
  }
  return best
}
