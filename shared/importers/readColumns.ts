import type { Column } from './Column'
import type { Table } from './readTable'

const unitWord = /^[[(]?(?:[kMm]?Hz|rad\/s(?:ec)?|dB|deg(?:rees?)?|°|rad(?:ians?)?|ratio|V\/V|1|-|)[\])]?$/i
const bracketed = /[[(]([^\])]*)[\])]\s*$/

/** Names and units of the columns, from the last rows before the numbers: a row of names, or of names and then of units. */
export function readColumns(table: Table): Column[] {
  const width = table.rows.slice(0, 200).reduce((widest, row) => Math.max(widest, row.cells.length), 0)
  const head = table.head.map(row => row.cells)
  const last = head.at(-1)
  const before = head.at(-2)
  const hasUnits = before !== undefined && last !== undefined && last.every(cell => unitWord.test(cell)) && last.some(cell => cell !== '')
  const names = (hasUnits ? before : last) ?? []
  return Array.from({ length: width }, (_, index) => {
    const name = names[index] ?? ''
    const unit = hasUnits ? last[index] ?? '' : bracketed.exec(name)?.[1] ?? ''
    return { name: name === '' ? `column ${index + 1}` : name, unit: unit.replace(/^[[(]|[\])]$/g, '') }
  })
}
