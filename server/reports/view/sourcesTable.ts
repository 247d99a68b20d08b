import type { PlacedCell } from './cellsOf'
import type { TableView } from './ReportView'
import { tableOf } from './tableOf'
import type { CellDraft } from './tableOf'
import { kindNames, sourceWords } from './sourceWords'

/** Where each condition's loop gain comes from; conditions with the very same definition share a row. */
export function sourcesTable(cells: readonly PlacedCell[]): TableView {
  const rows: { conditions: string[], key: string, cells: CellDraft[] }[] = []
  for (const { cell: { source, failure, analysis }, condition } of cells) {
    const said = source === null ? 'no source of record' : sourceWords(source.definition, analysis?.structure)
    const file = source?.file ? `file ${source.file.name}, SHA-256 ${source.file.sha256}` : ''
    const failed = failure === null ? '' : `no analysis: ${failure.message}`
    const key = JSON.stringify([source?.name, source?.kind, said, file, failed])
    const same = rows.find(row => row.key === key)
    if (same) {
      same.conditions.push(condition.code)
      continue
    }
    rows.push({
      conditions: [condition.code],
      key,
      cells: [
        { text: source?.name ?? 'none', tone: source ? 'plain' : 'open' },
        { text: source ? kindNames[source.kind] : 'no data', tone: source ? 'plain' : 'open' },
        { text: said, isMono: source !== null && source.kind !== 'measured', small: [file, failed].filter(text => text !== '').join('. '), tone: failure ? 'open' : 'plain' },
      ],
    })
  }
  for (const { cell: { otherSources = [] }, condition } of cells) {
    for (const { name, kind, setAsideReason, failure } of otherSources) {
      const failed = failure === null ? '' : `no analysis: ${failure.message}`
      const key = JSON.stringify(['set aside', name, kind, setAsideReason, failed])
      const same = rows.find(row => row.key === key)
      if (same) same.conditions.push(condition.code)
      else rows.push({ conditions: [condition.code], key, cells: [{ text: name }, { text: kindNames[kind] }, { text: `set aside: ${setAsideReason || 'no reason given'}`, small: failed, tone: 'quiet' }] })
    }
  }
  return tableOf({
    caption: rows.some(row => row.key.startsWith('["set aside"')) ? 'Sources of record, and those set aside' : 'Sources of record',
    columns: [{ head: 'conditions' }, { head: 'source' }, { head: 'kind' }, { head: 'definition', isWide: true }],
    rows: rows.map(row => ({ cells: [{ text: row.conditions.join(', '), isHead: true }, ...row.cells] })),
    notes: [],
    kind: 'sources',
  })
}
