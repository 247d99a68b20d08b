/** A value of a CSV cell; null is an empty cell. */
export type CsvValue = string | number | null

/** White space before the sign counts too: some spreadsheets drop it. */
const isFormula = (text: string) => /^\s*[=+\-@]|^[\t\r\n\0]/.test(text)

function cellOf(value: CsvValue): string {
  if (value === null) return ''
  if (typeof value === 'number') return String(value === 0 ? 0 : value)
  // A spreadsheet runs a text that begins like a formula; a leading quote keeps it a text. Numbers are written as numbers and stay.
  const text = isFormula(value) ? `'${value}` : value
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text
}

/** A table as CSV of RFC 4180 (Shafranovich, Common Format and MIME Type for CSV Files, 2005): comma, CRLF, quotes where needed, full digits. */
export function csvOf(head: readonly string[], rows: readonly (readonly CsvValue[])[]): string {
  return [head, ...rows].map(row => row.map(cellOf).join(',') + '\r\n').join('')
}
