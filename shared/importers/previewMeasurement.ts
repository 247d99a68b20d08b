import type { MeasurementMapping } from '../types/source'
import type { Column } from './Column'
import type { Dialect } from './Dialect'
import { guessMapping } from './guessMapping'
import type { MeasurementProblem } from './MeasurementProblem'
import { measurementLimits } from './measurementLimits'
import { parseDecimal } from './parseDecimal'
import { readColumns } from './readColumns'
import { readTable } from './readTable'
import type { TableRow } from './splitRows'

export interface MeasurementPreview {
  columns: Column[]
  /** the first rows of numbers, as written */
  rows: TableRow[]
  rowCount: number
  /** null where the file is no table */
  dialect: Dialect | null
  /** text of the comment lines */
  comments: string[]
  /** a first mapping for a person to confirm; null where the head and the numbers say too little */
  guess: MeasurementMapping | null
  /** rows that hold something that is no number; where the file is no table, the one problem that says so */
  rejectedRows: MeasurementProblem[]
}

/**
 * What an uploaded file looks like, before its columns are confirmed: delimiter , ; or TAB, decimal point or comma, byte order
 * mark, comment lines, a head of names and perhaps of units.
 *
 * @param shown rows given back @default 12
 */
export function previewMeasurement(text: string, shown = 12): MeasurementPreview {
  const table = readTable(text)
  if ('message' in table) {
    return { columns: [], rows: [], rowCount: 0, dialect: null, comments: [], guess: null, rejectedRows: [{ line: table.line ?? 0, message: table.message }] }
  }
  const columns = readColumns(table)
  const { dialect, comments, rows } = table
  const rejectedRows = rows.flatMap(({ line, cells }): MeasurementProblem[] => {
    const at = cells.findIndex(cell => cell !== '' && parseDecimal(cell, dialect.decimalComma) === null)
    return at < 0 ? [] : [{ line, message: `"${cells[at]!.slice(0, 40)}" in ${columns[at]?.name ?? `column ${at + 1}`} is no number.` }]
  })
  return { columns, rows: rows.slice(0, shown), rowCount: rows.length, dialect, comments, guess: guessMapping(table, columns), rejectedRows: rejectedRows.slice(0, measurementLimits.problems) }
}
