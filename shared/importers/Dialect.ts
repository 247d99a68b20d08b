/** How a text file writes its table. */
export interface Dialect {
  delimiter: ',' | ';' | '\t'
  decimalComma: boolean
}
