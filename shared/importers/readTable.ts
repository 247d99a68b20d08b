import type { Dialect } from './Dialect'
import { guessDialect } from './guessDialect'
import { measurementLimits } from './measurementLimits'
import { parseDecimal } from './parseDecimal'
import { splitRows, type TableRow } from './splitRows'

export interface Table {
  dialect: Dialect
  /** text of the comment lines (starting with #, % or //), in order */
  comments: string[]
  /** rows before the first row of numbers */
  head: TableRow[]
  /** every row from the first row of numbers on, blank lines left out */
  rows: TableRow[]
}

const comment = /^\s*(?:#|%|\/\/)\s?(.*)$/

/**
 * A text file as a table: byte order mark, line ends, comments and blank lines taken away, line numbers kept.
 * Returns a message, where it can with the line, in place of the table where the file cannot be one.
 */
export function readTable(text: string): Table | { message: string, line?: number } {
  if (text.length > measurementLimits.characters) {
    return { message: `The file has ${text.length} characters; at most ${measurementLimits.characters} (20 MB) are read.` }
  }
  if (text.includes('\0')) return { message: 'This is no text file: export the response as comma separated values.' }
  const comments: string[] = []
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/).map((line) => {
    const found = comment.exec(line)
    if (found) comments.push(found[1]!.trim())
    return found ? '' : line
  })
  if (lines.every(line => line.trim() === '')) return { message: 'The file is empty.' }
  const dialect = guessDialect(lines)
  if (dialect === null) {
    return { message: 'No line of the file reads as three numbers: columns may be separated by comma, semicolon or tabulator, and there must be at least frequency and two values.' }
  }
  const rows = splitRows(lines.join('\n'), dialect)
  if ('message' in rows) return rows
  const first = rows.findIndex(row => isNumeric(row.cells, dialect))
  return { dialect, comments, head: rows.slice(0, first), rows: rows.slice(first) }
}

function isNumeric(cells: string[], dialect: Dialect): boolean {
  return cells.length >= 3 && cells.every(cell => cell === '' || parseDecimal(cell, dialect.decimalComma) !== null)
}
