/** A column of a table that is typed or pasted into. */
export interface GridColumn {
  label: string
  /** words; a number otherwise */
  isText?: boolean
}
