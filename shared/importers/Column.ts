/** A column of an uploaded table as its head names it. */
export interface Column {
  /** name in the head, or 'column 3' where there is none */
  name: string
  /** unit from a row of units or from brackets in the name; '' where there is none */
  unit: string
}
