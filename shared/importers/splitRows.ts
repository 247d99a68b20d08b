import Papa from 'papaparse'
import type { Dialect } from './Dialect'

export interface TableRow {
  /** line of the file, counted from 1 */
  line: number
  cells: string[]
}

/**
 * The rows of a text in a dialect, blank ones left out, each with its line. Returns a message with its line in their place where a quotation mark swallows
 * rows.
 */
export function splitRows(text: string, dialect: Dialect): TableRow[] | { message: string, line: number } {
  const rows: TableRow[] = []
  let line = 1
  const { data, errors } = Papa.parse<string[]>(text, { delimiter: dialect.delimiter, newline: '\n' })
  const unquoted = errors.find(error => error.type === 'Quotes')?.row
  for (const [index, cells] of data.entries()) {
    // The rows a stray quotation mark swallows would be missing without a word.
    if (index === unquoted) return { line, message: 'A quotation mark in this line is not closed, or not where a cell ends: all up to the end of the file would be one cell. Take it away.' }
    if (cells.some(cell => cell.trim() !== '')) rows.push({ line, cells: cells.map(cell => cell.trim()) })
    // A quoted cell may hold line ends of its own.
    line += 1 + cells.reduce((sum, cell) => sum + (cell.includes('\n') ? cell.split('\n').length - 1 : 0), 0)
  }
  return rows
}
