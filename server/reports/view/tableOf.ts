import type { TableCell, TableColumn, TableView } from './ReportView'

/** A cell as a table's builder writes it: its text, and what else it has. */
export type CellDraft = Pick<TableCell, 'text'> & Partial<TableCell>

export interface TableDraft {
  caption: string
  columns: (Pick<TableColumn, 'head'> & Partial<TableColumn>)[]
  rows: { cells: CellDraft[], isMarked?: boolean }[]
  notes?: string[]
  kind: string
}

/** Rows up to which a table is kept on one page. */
const rowsOfShortTable = 12

/** A table with every field the templates name, for they refuse a field that is missing. Throws a RangeError for a row of another length than the head. */
export function tableOf({ caption, columns, rows, notes = [], kind }: TableDraft): TableView {
  return {
    caption,
    columns: columns.map(column => ({ unit: '', isNumber: false, isWide: false, ...column })),
    rows: rows.map(({ cells, isMarked = false }, index) => {
      if (cells.length !== columns.length) throw new RangeError(`row ${index + 1} of '${caption}' has ${cells.length} cells for ${columns.length} columns`)
      return { isMarked, cells: cells.map(cell => ({ small: '', tone: 'plain' as const, target: '', drawing: null, isHead: false, isMono: false, ...cell })) }
    }),
    isShort: rows.length <= rowsOfShortTable,
    notes,
    kind,
  }
}
