import type { OperatingCondition } from '#shared/types/system'
import { parseNumberText } from './parseNumberText'
import { pastedCells } from './pastedCells'

export interface ConditionTable {
  parameters: { name: string, unit: string, values: Record<number, string> }[]
  /** codes of the conditions that have a row */
  codes: string[]
}

/**
 * A table as spreadsheets keep values by condition: a head of parameter names ('J', 'J, kg m2', 'J [kg m2]'), then one row a condition that begins with its
 * code or name. Cells are separated by tabs, semicolons or commas; an empty cell is no value. All or nothing: every fault with its line.
 */
export function readConditionTable(text: string, conditions: readonly OperatingCondition[]): ConditionTable | { problems: string[] } {
  const lines = text.split(/\r?\n/).map((line, index) => ({ line: index + 1, text: line })).filter(({ text }) => text.trim() !== '')
  const [first, ...rest] = lines
  if (first === undefined || rest.length === 0) return { problems: ['Paste a head with the names of the parameters, and below it one row for each condition.'] }
  const separator = ['\t', ';', ','].find(candidate => first.text.includes(candidate)) ?? '\t'
  const cellsOf = (line: string) => separator === '\t' ? pastedCells(`${line}\t`, { numbers: true })![0]!.slice(0, -1) : line.split(separator).map(cell => cell.trim())
  const parameters = cellsOf(first.text).slice(1).map((head) => {
    const [, name = '', unit = ''] = /^(.*?)(?:\s*[[(]([^\])]*)[\])]|\s*,\s*(.*))?$/.exec(head) ?? []
    return { name: name.trim(), unit: (unit || (separator === ',' ? '' : head.split(',')[1] ?? '')).trim(), values: {} as Record<number, string> }
  })
  const problems = parameters.flatMap(({ name }, index) => {
    if (!/^[A-Za-z]\w*$/.test(name)) return [`Line ${first.line}, column ${index + 2}: '${name}' cannot be the name of a parameter: a letter, then letters, digits and underscores.`]
    return parameters.findIndex(other => other.name === name) < index ? [`Line ${first.line}, column ${index + 2}: ${name} stands twice.`] : []
  })
  if (parameters.length === 0) problems.push(`Line ${first.line} has no name of a parameter after its first cell.`)
  const codes: string[] = []
  for (const { line, text } of rest) {
    const [label = '', ...cells] = cellsOf(text)
    const condition = conditions.find(({ code, name }) => [code, name].some(word => word.toLowerCase() === label.toLowerCase()))
    if (condition === undefined) {
      problems.push(`Line ${line}: '${label}' is no condition of this system; its conditions are ${conditions.map(({ code }) => code).join(', ')}.`)
      continue
    }
    if (codes.includes(condition.code)) problems.push(`Line ${line}: ${condition.code} stands twice.`)
    codes.push(condition.code)
    const extra = cells.slice(parameters.length).find(cell => cell !== '')
    if (extra !== undefined) problems.push(`Line ${line}: there are more values than names; '${extra}' stands under none.`)
    parameters.forEach((parameter, index) => {
      const cell = cells[index] ?? ''
      if (Number.isNaN(parseNumberText(cell) ?? 0)) problems.push(`Line ${line}: '${cell}' for ${parameter.name} is not a number. Write it like 12.5 or 1.2e3.`)
      parameter.values[condition.id] = cell
    })
  }
  return problems.length > 0 ? { problems } : { parameters, codes }
}
