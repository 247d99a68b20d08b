/**
 * The cells of a pasted table, row by row; null where a single cell was pasted, which the field takes by itself. Columns are separated by tabs as a
 * spreadsheet copies them; `numbers` also takes rows as they stand in code or a CSV file, '{ 16384, -32000, 15800 },', and decimal commas.
 */
export function pastedCells(text: string, { numbers = false } = {}): string[][] | null {
  const hasTabs = text.includes('\t')
  const lines = text.replace(/\r?\n$/, '').split(/\r?\n/)
  if (!hasTabs && lines.length === 1 && !(numbers && /\S[\s,;]+\S/.test(text.trim()))) return null
  if (hasTabs || !numbers) return lines.map(line => line.split('\t').map(cell => numbers ? withPoint(cell.trim()) : cell.trim()))
  const semicolons = text.includes(';') && !/\d;\s*$/m.test(text)
  return lines.map(line => line.replace(/[{}[\]()]/g, ' ').trim().replace(/[,;]$/, '')).filter(line => line !== '')
    .map(line => semicolons ? line.split(';').map(cell => withPoint(cell.trim())) : line.split(/[\s,;]+/).filter(cell => cell !== '').map(cell => cell.replace(/(?<=\d\.?\d*)[fFlL]$/, '')))
}

/** '0,5' as spreadsheets of some languages write it. */
const withPoint = (cell: string) => /^[+-]?\d+,\d+(?:e[+-]?\d+)?$/i.test(cell) ? cell.replace(',', '.') : cell
